/** The draft of a scenario: editing, undoing, names. */
import { describe, expect, it } from 'vitest';
import {
  addPush,
  canAdd,
  changeKind,
  type DraftHistory,
  editPush,
  firstDraft,
  listPushes,
  nameScenario,
  redo,
  removeOpen,
  startHistory,
  takeStep,
  undo,
} from '@/app/_components/change/scenario-draft';
import { createWords } from '@/lib/brief/words';
import { MAX_PUSHES } from '@/lib/scenario/push-bounds';
import { firstPush } from '@/lib/scenario/push-limits';
import { MAX_NAME_LENGTH } from '@/lib/series/limits';
import { makeSample } from '../brief/sample-report';

const SCALE = { focalUsers: 40_000, rivalUsers: 30_000, horizonMonths: 24 };
const first = firstDraft(SCALE);

describe('the first draft', () => {
  it('is a push of the rival for a time', () => {
    expect(first.pushes).toMatchObject([{ firm: 2, kind: 'recruits', lengthMonths: 6 }]);
    expect(listPushes(first)).toHaveLength(1);
  });
});

describe('editing', () => {
  it('changes the open push alone', () => {
    const two = addPush(first, firstPush(1, 'room', SCALE));
    const edited = editPush(two, { startMonth: 9 });
    expect(two.open).toBe(1);
    expect(edited.pushes[0]).toBe(two.pushes[0]);
    expect(edited.pushes[1]).toMatchObject({ kind: 'room', startMonth: 9 });
  });

  it('another kind begins at its own first size and keeps when and how long', () => {
    const timed = editPush(first, { startMonth: 7, lengthMonths: 11 });
    const [push] = changeKind(timed, 'pull', SCALE).pushes;
    expect(push).toMatchObject({ kind: 'pull', size: 0.2, startMonth: 7, lengthMonths: 11 });
  });

  it('a spend that buys recruits sets their number', () => {
    const response = { costPerRecruit: 4, mostPerMonth: null };
    const [push] = editPush(first, { response, spendPerMonth: 1000 }).pushes;
    expect(push!.size).toBe(250);
  });

  it('a push of size 0 pushes nothing, and a scenario may be empty', () => {
    expect(listPushes(editPush(first, { size: 0 }))).toEqual([]);
    const empty = removeOpen(first);
    expect(empty).toEqual({ pushes: [], open: 0, money: null });
    expect(editPush(empty, { size: 1 })).toEqual(empty);
    expect(removeOpen(empty)).toEqual(empty);
  });

  it('takes no more pushes than a scenario may have', () => {
    let draft = first;
    for (let i = 0; i < MAX_PUSHES + 3; i++) draft = addPush(draft, first.pushes[0]!);
    expect(draft.pushes).toHaveLength(MAX_PUSHES);
    expect(canAdd(draft)).toBe(false);
    expect(draft.open).toBe(MAX_PUSHES - 1);
  });
});

describe('history', () => {
  const move = (history: DraftHistory, size: number, step: string | null) =>
    takeStep(history, editPush(history.now, { size }), step);

  it('undoes the moves of one slider at once, and does them again', () => {
    let history = startHistory(first);
    for (const size of [10, 20, 30]) history = move(history, size, '0 size');
    history = move(history, 99, '0 startMonth');
    const once = undo(history)!;
    expect(once.now.pushes[0]!.size).toBe(30);
    const twice = undo(once)!;
    expect(twice.now).toEqual(first);
    expect(undo(twice)).toBeNull();
    expect(redo(redo(twice)!)!.now).toEqual(history.now);
    expect(redo(history)).toBeNull();
  });

  it('forgets what was undone when something else is done', () => {
    const history = move(undo(move(startHistory(first), 10, null))!, 77, null);
    expect(redo(history)).toBeNull();
    expect(history.now.pushes[0]!.size).toBe(77);
  });

  it('a step after an undo is a step of its own', () => {
    const moved = move(startHistory(first), 10, '0 size');
    const again = move(undo(moved)!, 20, '0 size');
    expect(undo(again)!.now).toEqual(first);
  });
});

describe('nameScenario', () => {
  const words = createWords(makeSample('coexistence').facts, 'en-GB');

  it('tells firm, size, start and length of the first push, and how many more there are, within what a name may have', () => {
    const one = nameScenario(words, first.pushes);
    expect(one).toContain('recruits a month');
    const many = nameScenario(words, [...first.pushes, ...first.pushes, ...first.pushes]);
    expect([...many].length).toBeLessThanOrEqual(MAX_NAME_LENGTH);
    expect(nameScenario(words, [])).toBe('');
  });
});
