/**
 * Version of everything that turns a series and options into numbers (estimate and forecast). Goes up with every change that changes
 * a number; a stored result keeps the version that made it.
 */
export const ENGINE_VERSION = '0.4.0';
