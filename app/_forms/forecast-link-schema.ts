/** What the action that makes a forecast link accepts: one of the offered lengths, or null for "until it is withdrawn". */
import { z } from 'zod';
import { LINK_DAYS } from './forecast-link-days';

export const forecastLinkDaysSchema = z.literal(LINK_DAYS).nullable();
