/** Ids of the four outcomes as results name them. Apart from the schemas, so that a page that only names outcomes carries no validator. */
export const OUTCOMES = ['coexistence', 'exclusionByFocal', 'exclusionByRival', 'headStartDecides'] as const;
export type Outcome = (typeof OUTCOMES)[number];
