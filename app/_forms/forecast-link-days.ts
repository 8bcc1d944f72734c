/** How long a forecast link opens, as the page offers it; the form and its action share this. */
import { z } from 'zod';

export const LINK_DAYS = [7, 30, 90, 365] as const;
export const DEFAULT_LINK_DAYS = 30;

/** null: until it is withdrawn. */
export const forecastLinkDaysSchema = z.literal(LINK_DAYS).nullable();
