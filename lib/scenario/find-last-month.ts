/**
 * The last useful month: the latest whole month in which a given counter-push may start and still keep the share with the wished
 * chance. Chance is not monotone in the start (an early short push has faded by then), so months are tried from the target backwards; a
 * month is given up as soon as too many draws have lost the share, those that lost it last time being tried first.
 */
import { type AnswerRun, WorkMeter } from './answer-run';
import type { LastUsefulMonth, Reach } from './answers';
import type { PreparedScenario } from './prepare-scenario';
import type { PricedPush } from './spend';
import { TargetCheck, type TargetQuestion } from './target-check';

/** Months tried when none does, to find the best; the neighbours of the best are tried after them. */
const MONTHS_TRIED = 24;

export function* findLastUsefulMonth(
  prepared: PreparedScenario,
  { target, counter, pushes }: TargetQuestion,
): AnswerRun<LastUsefulMonth> {
  const check = new TargetCheck(prepared, target, pushes);
  yield* check.prepare();
  const base = check.reachOf(check.listBaseShares());
  if (base.chance * check.count >= check.needed) {
    return { code: 'not-needed', target, push: counter, reach: base };
  }
  const search = new MonthSearch(check, counter);
  for (let startMonth = target.month - 1; startMonth >= 0; startMonth--) {
    if (!(yield* search.does(startMonth))) continue;
    const reach = yield* search.reach(startMonth);
    return { code: 'found', target, push: { ...counter, startMonth }, startMonth, reach };
  }
  const { startMonth, reach } = yield* search.findBest();
  return { code: 'no-month-does', target, push: { ...counter, startMonth }, startMonth, reach };
}

class MonthSearch {
  private readonly meter: WorkMeter;
  /** Draws in the order in which they are tried. */
  private readonly order: Int32Array;

  constructor(
    private readonly check: TargetCheck,
    private readonly counter: PricedPush,
  ) {
    this.meter = new WorkMeter((check.count * check.target.month * MONTHS_TRIED) / 2);
    this.order = Int32Array.from({ length: check.count }, (_, i) => i);
  }

  /** Whether enough draws keep the share when the push starts in this month. */
  *does(startMonth: number): AnswerRun<boolean> {
    const { check, order } = this;
    const forcing = check.forcingWith({ ...this.counter, startMonth });
    const mayLose = check.count - check.needed;
    let lost = 0;
    for (let k = 0; k < order.length; k++) {
      const i = order[k]!;
      if (!check.keeps(check.shareUnder(forcing, i, startMonth))) {
        order[k] = order[lost]!;
        order[lost] = i;
        lost++;
        if (lost > mayLose) return false;
      }
      if (this.meter.add(check.target.month - startMonth)) yield this.meter.progress;
    }
    return true;
  }

  *reach(startMonth: number): AnswerRun<Reach> {
    const { check } = this;
    const forcing = check.forcingWith({ ...this.counter, startMonth });
    const shares = new Float64Array(check.count);
    for (let i = 0; i < shares.length; i++) {
      shares[i] = check.shareUnder(forcing, i, startMonth);
      if (this.meter.add(check.target.month - startMonth)) yield this.meter.progress;
    }
    return check.reachOf(shares);
  }

  /** The month with the best chance; of equals the one that keeps more share. */
  *findBest(): AnswerRun<{ startMonth: number; reach: Reach }> {
    const last = this.check.target.month - 1;
    const stride = Math.ceil((last + 1) / MONTHS_TRIED);
    let best = { startMonth: 0, reach: yield* this.reach(0) };
    for (let startMonth = stride; startMonth <= last; startMonth += stride) {
      best = better(best, { startMonth, reach: yield* this.reach(startMonth) });
    }
    const [from, to] = [
      Math.max(0, best.startMonth - stride + 1),
      Math.min(last, best.startMonth + stride - 1),
    ];
    for (let startMonth = from; startMonth <= to; startMonth++) {
      if (startMonth % stride === 0) continue;
      best = better(best, { startMonth, reach: yield* this.reach(startMonth) });
    }
    return best;
  }
}

type Candidate = { startMonth: number; reach: Reach };

function better(a: Candidate, b: Candidate): Candidate {
  if (a.reach.chance !== b.reach.chance) return a.reach.chance > b.reach.chance ? a : b;
  return a.reach.shareKept >= b.reach.shareKept ? a : b;
}
