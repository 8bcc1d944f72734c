/** The outer limits of a push from outside, apart from its schema so that a page's controls carry no validator. */
export const PUSH_KINDS = ['recruits', 'growth-lift', 'pull', 'room'] as const;

/** Furthest month that a push may reach: ten years. */
export const MAX_PUSH_MONTHS = 120;
/** Largest relative push: six times as strong. */
export const MAX_RELATIVE_SIZE = 5;
/** Largest recruits per month: more than people live. */
export const MAX_RECRUITS_PER_MONTH = 1e10;
/** Longest carry-over half-life, months. */
export const MAX_CARRY_OVER_HALF_LIFE = 24;
/** Most pushes in one scenario. */
export const MAX_PUSHES = 12;
/** Most money of one kind, in whatever currency: more than any market is worth. */
export const MAX_MONEY = 1e15;
/** Longest name of a scenario. */
export const MAX_SCENARIO_NAME_LENGTH = 80;
/** Most scenarios side by side. */
export const MAX_SIDE_BY_SIDE = 4;

/** Longest label of a currency: "EUR", "1,000 US$". */
export const MAX_CURRENCY_LENGTH = 16;
/** Largest discount rate per year: 1,000 %. */
export const MAX_DISCOUNT_RATE = 10;
