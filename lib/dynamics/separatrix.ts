/**
 * The separatrix of a market in which the head start decides (alpha > 1, beta > 1): the stable manifold of the shared saddle. It is a
 * rising curve from (0, 0) through the saddle outwards. Below it (more of firm 1) firm 1 ends alone, above it firm 2.
 *
 * Traced from the saddle backwards in time, in scaled state x = N1/K1, y = N2/K2, from a point a small way along the stable
 * eigenvector v to either side. With p = x*, q = rho y* and the stable eigenvalue m of [[-p, -alpha x*], [-rho beta y*, -q]]:
 *
 *   v = (alpha x*, -p - m)       both components positive, since m < -p
 *
 * Backwards in time every deviation across the curve dies out, so the trace is as good as the integrator.
 * With equal growth rates the curve is the straight ray y/x = (1 - beta)/(1 - alpha).
 */
import { findSharedEquilibrium } from './equilibria';
import { type Integration, integrate, type RightHandSide } from './integrate';
import { classifyOutcome, type Outcome } from './outcome';
import { type CompetitionSystem, fillGrowth, type State, toScaledSystem } from './system';

/** Users up to which the curve is wanted; both positive. */
export interface Frame {
  n1Max: number;
  n2Max: number;
}

export type SeparatrixTrace =
  | { status: 'traced'; saddle: State; points: State[] }
  | { status: 'none'; outcome: Exclude<Outcome, 'headStartDecides'> };

export type SeparatrixSide = 'firstWins' | 'secondWins' | 'onSeparatrix';

/** Distance of the first point from the saddle in units of K; the curve leaves its tangent by the square of it, 1e-12. */
const FIRST_DISTANCE = 1e-6;
const TRACE_TOLERANCE = 1e-11;
/** The inner branch ends where both firms are below this share of the saddle; from there the curve is closed at (0, 0). */
const INNER_END_SHARE = 1e-4;
/** Longest gap between neighbouring points, as a share of the frame. */
const POINT_SPACING = 0.01;
/** Scaled time enough for a path next to the saddle to leave it and come near the frame, unless an eigenvalue is almost 0. */
const MAX_SCALED_TIME = 1e5;
const SIDE_TOLERANCE = 1e-10;
/** Bisection steps to a point of the path: 2^-60 of a step is below rounding. */
const BISECTION_STEPS = 60;

/**
 * The separatrix inside the frame [0, n1Max] x [0, n2Max], from (0, 0) to where it leaves the frame, in rising order.
 * @throws RangeError when the frame is not positive and finite
 */
export function traceSeparatrix(system: CompetitionSystem, frame: Frame): SeparatrixTrace {
  checkFrame(frame);
  const saddle = findSaddle(system);
  if (!saddle)
    return { status: 'none', outcome: classifyOutcome(system) as Exclude<Outcome, 'headStartDecides'> };
  const scaledFrame: State = [frame.n1Max / system.k1, frame.n2Max / system.k2];
  const inner = followInwards(system, saddle);
  const outer = followOutwards(system, saddle, scaledFrame);
  const points: State[] = [
    [0, 0],
    ...samplePath(inner, scaledFrame).reverse(),
    saddle,
    ...samplePath(outer, scaledFrame),
  ];
  return {
    status: 'traced',
    saddle: [saddle[0] * system.k1, saddle[1] * system.k2],
    points: cutAtFrame(points, scaledFrame).map(([x, y]) => [x * system.k1, y * system.k2] as const),
  };
}

/**
 * Users of firm 2 on the separatrix where firm 1 has n1 users, or null when the head start does not decide (or when n1 is so
 * far out that the curve cannot be followed to it).
 * @throws RangeError when n1 is not positive and finite
 */
export function separatrixHeight(system: CompetitionSystem, n1: number): number | null {
  if (!(n1 > 0 && n1 < Number.POSITIVE_INFINITY)) {
    throw new RangeError(`separatrixHeight: n1 must be positive and finite, got ${n1}`);
  }
  const saddle = findSaddle(system);
  if (!saddle) return null;
  const x = n1 / system.k1;
  if (Math.abs(x - saddle[0]) <= FIRST_DISTANCE * stableDirection(system, saddle)[0]) {
    const [vx, vy] = stableDirection(system, saddle);
    return (saddle[1] + ((x - saddle[0]) * vy) / vx) * system.k2;
  }
  const isInner = x < saddle[0];
  const branch = follow(system, saddle, isInner ? -1 : 1, (_, at) => (isInner ? at[0] <= x : at[0] >= x));
  return branch.status === 'stopped' ? findCrossing(branch, x, isInner)[1] * system.k2 : null;
}

/**
 * Which firm ends alone from this state. Told by going forwards: once one firm grows while the other shrinks, that stays so
 * for ever (the quadrant of signs is invariant in a competitive system of two), so the first such moment decides.
 * Null when the head start does not decide in this market.
 * @throws RangeError when the state has a negative or non-finite entry
 */
export function sideOfSeparatrix(system: CompetitionSystem, state: State): SeparatrixSide | null {
  if (!(state[0] >= 0 && state[1] >= 0 && state[0] + state[1] < Number.POSITIVE_INFINITY)) {
    throw new RangeError(`sideOfSeparatrix: state must be finite and not negative, got ${state}`);
  }
  if (classifyOutcome(system) !== 'headStartDecides') return null;
  if (state[0] === 0 || state[1] === 0) return sideOnAxis(state);
  const growth = new Float64Array(2);
  const readSide = (y: ArrayLike<number>): SeparatrixSide => {
    fillGrowth(system, y, growth);
    if (growth[0] > 0 && growth[1] < 0) return 'firstWins';
    return growth[0] < 0 && growth[1] > 0 ? 'secondWins' : 'onSeparatrix';
  };
  const run = integrate((_, y, out) => fillGrowth(system, y, out), 0, state, MAX_SCALED_TIME / system.r1, {
    relativeTolerance: SIDE_TOLERANCE,
    // Relative alone: how far behind a firm is may hang on its last digits while it is still small.
    absoluteTolerance: 0,
    shouldStop: (_, y) => readSide(y) !== 'onSeparatrix',
  });
  return readSide(run.y);
}

function sideOnAxis(state: State): SeparatrixSide {
  if (state[0] === state[1]) return 'onSeparatrix';
  return state[0] > 0 ? 'firstWins' : 'secondWins';
}

function checkFrame(frame: Frame): void {
  for (const id of ['n1Max', 'n2Max'] as const) {
    if (!(frame[id] > 0 && frame[id] < Number.POSITIVE_INFINITY)) {
      throw new RangeError(`traceSeparatrix: frame.${id} must be positive and finite, got ${frame[id]}`);
    }
  }
}

/** The saddle in units of K, or null when the head start does not decide. */
function findSaddle(system: CompetitionSystem): State | null {
  const shared = findSharedEquilibrium(system);
  if (shared?.kind !== 'saddle') return null;
  return [shared.point[0] / system.k1, shared.point[1] / system.k2];
}

/** Stable eigenvector at the saddle, length 1, both components positive. */
function stableDirection(system: CompetitionSystem, [x, y]: State): State {
  const { rho, alpha, beta } = toScaledSystem(system);
  const p = x;
  const q = rho * y;
  const root = Math.sqrt((p - q) ** 2 + 4 * p * q * alpha * beta);
  // -p - m = (q - p + root)/2, taken without cancellation when q < p.
  const rise = q >= p ? (q - p + root) / 2 : (2 * p * q * alpha * beta) / (p - q + root);
  const length = Math.hypot(alpha * x, rise);
  return [(alpha * x) / length, rise / length];
}

/** Backwards in scaled time from beside the saddle, to the side of `sign`, until `shouldStop`. */
function follow(
  system: CompetitionSystem,
  saddle: State,
  sign: 1 | -1,
  shouldStop: (t: number, y: Float64Array) => boolean,
): Integration {
  const [vx, vy] = stableDirection(system, saddle);
  const start = [saddle[0] + sign * FIRST_DISTANCE * vx, saddle[1] + sign * FIRST_DISTANCE * vy];
  return integrate(slowedGrowth(system), 0, start, -MAX_SCALED_TIME, {
    relativeTolerance: TRACE_TOLERANCE,
    absoluteTolerance: 0,
    isDense: true,
    shouldStop,
  });
}

function followInwards(system: CompetitionSystem, saddle: State): Integration {
  return follow(
    system,
    saddle,
    -1,
    (_, at) => at[0] <= INNER_END_SHARE * saddle[0] && at[1] <= INNER_END_SHARE * saddle[1],
  );
}

function followOutwards(system: CompetitionSystem, saddle: State, frame: State): Integration {
  return follow(system, saddle, 1, (_, at) => at[0] >= frame[0] || at[1] >= frame[1]);
}

/**
 * Scaled growth on a clock that slows down far out, dt' = (1 + x + y) dt: the curve is the same, and going backwards no longer
 * reaches infinity in finite time.
 */
function slowedGrowth(system: CompetitionSystem): RightHandSide {
  const { rho, alpha, beta } = toScaledSystem(system);
  return (_, state, out) => {
    const slowing = 1 / (1 + state[0] + state[1]);
    out[0] = slowing * state[0] * (1 - state[0] - alpha * state[1]);
    out[1] = slowing * rho * state[1] * (1 - state[1] - beta * state[0]);
  };
}

/** Point of the branch at which its first component, which falls (inner branch) or rises all along, is x. */
function findCrossing(branch: Integration, x: number, isFalling: boolean): State {
  const path = branch.path!;
  const at = new Float64Array(2);
  let low = 0;
  let high = branch.t;
  for (let step = 0; step < BISECTION_STEPS; step++) {
    const middle = (low + high) / 2;
    path.evaluateAt(middle, at);
    if (at[0] > x === isFalling) low = middle;
    else high = middle;
  }
  path.evaluateAt((low + high) / 2, at);
  return [at[0], at[1]];
}

/** Points along the path about POINT_SPACING apart, for a smooth line in the frame; the end of the path is always one. */
function samplePath(branch: Integration, frame: State): State[] {
  const path = branch.path!;
  const at = new Float64Array(2);
  path.evaluateAt(0, at);
  let last: State = [at[0], at[1]];
  const points: State[] = [];
  for (let step = 0; step < path.steps; step++) {
    const [t0, t1] = [path.timeOf(step), path.timeOf(step + 1)];
    path.evaluateAt(t1, at);
    const pieces = Math.floor(frameGap(last, at, frame) / POINT_SPACING);
    for (let piece = 1; piece <= pieces; piece++) {
      path.evaluateAt(t0 + ((t1 - t0) * piece) / pieces, at);
      last = [at[0], at[1]];
      points.push(last);
    }
  }
  points.push([branch.y[0], branch.y[1]]);
  return points;
}

function frameGap(a: ArrayLike<number>, b: ArrayLike<number>, frame: State): number {
  return Math.max(Math.abs(a[0] - b[0]) / frame[0], Math.abs(a[1] - b[1]) / frame[1]);
}

/** Keeps the points inside the frame and ends the curve on its edge. */
function cutAtFrame(points: State[], frame: State): State[] {
  const outside = points.findIndex(([x, y]) => x > frame[0] || y > frame[1]);
  if (outside <= 0) return points;
  const [a, b] = [points[outside - 1], points[outside]];
  const share = Math.min(edgeShare(a[0], b[0], frame[0]), edgeShare(a[1], b[1], frame[1]));
  return [...points.slice(0, outside), [a[0] + share * (b[0] - a[0]), a[1] + share * (b[1] - a[1])]];
}

/** Share of the way from a to b at which the edge is met; 1 when b is inside. */
function edgeShare(a: number, b: number, edge: number): number {
  return b > edge ? (edge - a) / (b - a) : 1;
}
