import { describe, expect, it } from 'vitest';
import { fitReportSchema } from '@/lib/forecast/report';
import { makeSample, SAMPLES, type SampleName } from './sample-report';

describe('sample reports', () => {
  it.each(Object.keys(SAMPLES) as SampleName[])(
    '%s passes the schema and shows the outcome of its name',
    (name) => {
      const { facts, draws } = makeSample(name);
      const report = fitReportSchema.parse(facts.report);
      expect(report.outlook.decided).toBe(name === 'undecided' ? null : name);
      expect(draws.values).toHaveLength(draws.count * draws.columns.length);
    },
  );
});
