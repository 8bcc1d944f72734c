/** The settings of priors and the addressable market as they are stored, frozen and sent: with the ranges that make sense. */
import { z } from 'zod';
import type { AddressableMarket, LogNormalPrior, PriorSettings } from './types';

/** sd of a logarithm: from "within 9 %" to "within a factor of 27", nine times in ten. */
export const SD_RANGE = { min: 0.05, max: 2 } as const;
/** Middle of each prior, in the units of the parameter. */
export const MIDDLE_RANGES = {
  growth: { min: 0.001, max: 3 },
  saturation: { min: 0.2, max: 100 },
  alpha: { min: 0.01, max: 20 },
  beta: { min: 0.01, max: 20 },
} as const satisfies Record<keyof Omit<PriorSettings, 'noCompetition'>, { min: number; max: number }>;
export const NO_COMPETITION_RANGE = { min: 0, max: 0.9 } as const;
/** Share of the estimate that is one sd of it. */
export const RELATIVE_ERROR_RANGE = { min: 0.05, max: 3 } as const;

/** Room for the rounding of a logarithm at the ends of a range. */
const SLACK = 1e-9;

const prior = ({ min, max }: { min: number; max: number }) =>
  z.object({
    meanLog: z
      .number()
      .min(Math.log(min) - SLACK)
      .max(Math.log(max) + SLACK),
    sdLog: z.number().min(SD_RANGE.min).max(SD_RANGE.max),
  }) satisfies z.ZodType<LogNormalPrior>;

export const priorSettingsSchema = z.object({
  growth: prior(MIDDLE_RANGES.growth),
  saturation: prior(MIDDLE_RANGES.saturation),
  alpha: prior(MIDDLE_RANGES.alpha),
  beta: prior(MIDDLE_RANGES.beta),
  noCompetition: z.number().min(NO_COMPETITION_RANGE.min).max(NO_COMPETITION_RANGE.max),
}) satisfies z.ZodType<PriorSettings>;

const users = z.number().positive().nullable();

export const addressableSchema = z.object({
  focal: users,
  rival: users,
  relativeError: z.number().min(RELATIVE_ERROR_RANGE.min).max(RELATIVE_ERROR_RANGE.max),
}) satisfies z.ZodType<AddressableMarket>;
