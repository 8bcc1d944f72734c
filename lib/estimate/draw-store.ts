/**
 * Kept draws of one component: the table that forecasts read, the points themselves (for paths), and per chain the watched quantities
 * ln alpha, ln beta and both firms' ln users at the horizon.
 */
import { createMonthFlow } from '../dynamics/month-flow';
import { bulkEss, splitRHat } from '../numeric/convergence';
import type { RandomStream } from '../numeric/random';
import type { Posterior } from './posterior';

export interface DrawStore {
  readonly chains: number;
  readonly perChain: number;
  readonly count: number;
  keep(chain: number, q: Float64Array, stream: RandomStream): void;
  /** Worst R-hat and smallest ESS over the watched quantities. */
  judge(): { rHat: number; ess: number };
  /** Row i of the table of `posterior.columns`; chains interleaved: draw i of every chain, then draw i + 1. */
  row(i: number): Float64Array;
  /** q of draw i, in the same order. */
  point(i: number): Float64Array;
  /** ln levels of one draw of the path of draw i; false where it does not exist. */
  fillPath(i: number, stream: RandomStream, out: Float64Array): boolean;
}

/** ln users below which a firm counts as gone: keeps watched quantities finite. */
const GONE = -700;
const FIRST_ROOM = 2048;
const LEVEL_COLUMNS = ['r1', 'r2', 'k1', 'k2', 'alpha', 'beta', 'n1', 'n2'];

export function createDrawStore(posterior: Posterior, chains: number, horizonMonths: number): DrawStore {
  const width = posterior.columns.length;
  const { dimension } = posterior;
  const columns = LEVEL_COLUMNS.map((column) => posterior.columns.indexOf(column));
  const flow = createMonthFlow(1);
  const watched = Array.from({ length: chains }, () => [[], [], [], []] as number[][]);
  let table = new Float64Array(width * FIRST_ROOM);
  let points = new Float64Array(dimension * FIRST_ROOM);
  const breakMonths: (number | null)[] = [];

  /** Keeps ln alpha, ln beta and both firms' ln users at the horizon of the row at `at`. */
  const watch = (chain: number, at: number) => {
    const [r1, r2, k1, k2, alpha, beta, n1, n2] = columns;
    flow.setParameters(table[at + r1], table[at + r2], table[at + alpha], table[at + beta]);
    flow.state[0] = table[at + n1] / table[at + k1];
    flow.state[1] = table[at + n2] / table[at + k2];
    let isFollowed = true;
    for (let h = 0; isFollowed && h < horizonMonths; h++) isFollowed = flow.advance(0);
    const kept = watched[chain];
    kept[0].push(Math.log(table[at + alpha]));
    kept[1].push(Math.log(table[at + beta]));
    for (let i = 0; i < 2; i++) {
      const logLevel = Math.log(flow.state[i] * table[at + (i === 0 ? k1 : k2)]);
      kept[2 + i].push(isFollowed && logLevel > GONE ? logLevel : GONE);
    }
  };

  return {
    chains,
    get perChain() {
      return watched[chains - 1][0].length;
    },
    get count() {
      return breakMonths.length;
    },
    keep(chain, q, stream) {
      const i = breakMonths.length;
      table = withRoom(table, (i + 1) * width);
      points = withRoom(points, (i + 1) * dimension);
      points.set(q, i * dimension);
      posterior.fillDraw(q, stream, table, i * width);
      watch(chain, i * width);
      breakMonths.push(posterior.breakMonth);
    },
    judge() {
      const quantities = [0, 1, 2, 3].map((k) => watched.map((chain) => chain[k]));
      return {
        rHat: Math.max(...quantities.map(splitRHat)),
        ess: Math.min(...quantities.map(bulkEss)),
      };
    },
    row: (i) => table.subarray(i * width, (i + 1) * width),
    point: (i) => points.slice(i * dimension, (i + 1) * dimension),
    fillPath(i, stream, out) {
      posterior.breakMonth = breakMonths[i];
      return posterior.fillPath(this.point(i), stream, out);
    },
  };
}

function withRoom(values: Float64Array<ArrayBuffer>, needed: number): Float64Array<ArrayBuffer> {
  if (values.length >= needed) return values;
  const larger = new Float64Array(Math.max(2 * values.length, needed));
  larger.set(values);
  return larger;
}
