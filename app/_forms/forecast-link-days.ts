/** How long a forecast link opens, days, as the page offers it. */
export const LINK_DAYS = [7, 30, 90, 365] as const;
export const DEFAULT_LINK_DAYS = 30;
