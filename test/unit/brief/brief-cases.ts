/** Facts bent to a wanted result, and every sentence of a brief, for tests of words. */
import { buildBrief } from '@/lib/brief/build-brief';
import type { BriefFacts } from '@/lib/brief/facts';
import { plainText } from '@/lib/brief/text';
import type { Brief } from '@/lib/brief/types';
import type { FitReport, Odds, Outlook } from '@/lib/forecast/report';
import { makeSample, type SampleName } from './sample-report';

const cached = new Map<SampleName, BriefFacts>();

/** The facts of a sample; a fresh copy each time. */
export function factsOf(name: SampleName): BriefFacts {
  if (!cached.has(name)) cached.set(name, makeSample(name).facts);
  return structuredClone(cached.get(name)!);
}

/** Odds in the order coexistence, exclusion by focal, exclusion by rival, head start. */
export function oddsOf(both: number, focal: number, rival: number, headStart: number): Odds {
  return { coexistence: both, exclusionByFocal: focal, exclusionByRival: rival, headStartDecides: headStart };
}

/** A sample whose outlook is overwritten in part. */
export function factsWith(
  name: SampleName,
  outlook: Partial<Outlook>,
  report: Partial<FitReport> = {},
): BriefFacts {
  const facts = factsOf(name);
  facts.report = { ...facts.report, ...report, outlook: { ...facts.report.outlook, ...outlook } };
  return facts;
}

export function headlineOf(brief: Brief): string {
  return spaced(plainText(brief.where.verdict.headline));
}

export function supportOf(brief: Brief): string {
  return spaced(brief.where.verdict.support.map(plainText).join(' '));
}

/** Every sentence and label that a person reads, tables and ticks left out. */
export function proseOf(brief: Brief): string[] {
  const { where, why, trust } = brief;
  return [
    brief.dataLine,
    plainText(where.note),
    plainText(where.verdict.headline),
    ...where.verdict.support.map(plainText),
    where.verdict.plain,
    where.odds.description,
    ...where.milestones.flatMap((row) => [row.label, row.value, row.chance, plainText(row.sentence)]),
    plainText(where.forecast.users.caption),
    plainText(where.forecast.share.caption),
    plainText(why.phaseMap.caption),
    ...why.phaseMap.labels.map((label) => label.text),
    plainText(why.oddsMap.caption),
    ...why.oddsMap.quarters.map((quarter) => quarter.label),
    ...why.parameters.rows.flatMap((row) => [row.label, row.value, row.interval, row.meaning, row.learnt]),
    plainText(why.parameters.caption),
    ...trust.unknowns.map((line) => plainText(line.sentence)),
    plainText(trust.sampler.line),
    ...trust.sampler.details.map((detail) => detail.value),
    plainText(trust.leftOut),
  ].map(spaced);
}

/** No-break spaces as plain ones, for comparing. */
export function spaced(text: string): string {
  return text.replaceAll('\u00a0', ' ');
}

export function briefWith(...args: Parameters<typeof factsWith>): Brief {
  return buildBrief(factsWith(...args));
}
