/** What every command is asked. */
import type { Aggregation, DateOrder, DecimalMark } from '../series/types';

/** What every command reads: the file, and how far and with which random numbers it is forecast. */
export interface FitRequest {
  file: string;
  /** Headers of the month, the focal firm and the rival; null: guess them. */
  columns: [string, string, string] | null;
  /** Sheet of a workbook; null: the first one with a table. */
  sheet: string | null;
  /** Focal firm and rival as the rows name them, one row per month and firm; null: the columns tell. */
  firms: [string, string] | null;
  aggregation?: Aggregation;
  decimalMark?: DecimalMark;
  dateOrder?: DateOrder;
  horizonMonths: number;
  seed: number;
}
