// Stands in for the 'server-only' marker package, which throws under plain Node.
export {};
