import { describe, expect, it } from 'vitest';
import { buildBrief } from '@/lib/brief/build-brief';
import { buildPushBrief } from '@/lib/brief/push-brief';
import { factsOfIssued, openIssued } from '@/lib/issue/open';
import { readIssuedForecast } from '@/lib/issue/read';
import { comparison, issuedOf, sample } from './issued-cases';

function reopen(hasScenario: boolean) {
  const reading = readIssuedForecast(JSON.parse(JSON.stringify(issuedOf(hasScenario))));
  if (!reading.ok) throw new Error(reading.code);
  return reading.value;
}

describe('openIssued', () => {
  it('gives the very brief that the facts gave before they were frozen and stored', () => {
    expect(factsOfIssued(reopen(false))).toEqual(sample.facts);
    expect(openIssued(reopen(false)).brief).toEqual(buildBrief(sample.facts));
  });

  it('gives the very push that was compared, its words and its caution', () => {
    const { brief, scenario } = openIssued(reopen(true));
    expect(scenario!.push).toEqual(buildPushBrief(comparison, sample.facts));
    expect(scenario!.name).toBe('Their autumn campaign');
    expect(scenario!.pushes).toHaveLength(1);
    expect(scenario!.pushes[0]).toMatch(/^Marrowby: growth lift/);
    expect(brief.cautions.map((one) => one.id)).toContain('competition-law');
  });

  it('has no scenario where none was issued', () => {
    expect(openIssued(reopen(false)).scenario).toBeNull();
  });

  it('stamps the day in UTC whatever the zone of the reader, the issuer and the months', () => {
    expect(openIssued(reopen(false)).stamp).toBe(
      'Issued on January 8, 2026 by Ada Berg, from 42 months to December 2025.',
    );
  });

  it('stamps the day in UTC when the date was written in another zone', () => {
    const issued = { ...reopen(false), issuedAt: '2026-01-08T01:30:00+05:45' };
    expect(openIssued(issued).stamp).toContain('January 7, 2026');
  });
});
