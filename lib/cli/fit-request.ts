/** What every command is asked. */
import type { DateOrder, DecimalMark } from '../series/types';

/** What every command reads: the file, and how far and with which random numbers it is forecast. */
export interface FitRequest {
  file: string;
  /** Headers of the month, the focal firm and the rival; null: guess them. */
  columns: [string, string, string] | null;
  decimalMark?: DecimalMark;
  dateOrder?: DateOrder;
  horizonMonths: number;
  seed: number;
}
