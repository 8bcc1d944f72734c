'use client';

/** What the table does not say: the market's name, what is counted, the firms' names, how exact each count is. */
import type { FieldSentences } from '@/app/_lib/explain-field';
import { ChoiceField } from '../controls/choice-field';
import { TextField } from '../controls/text-field';
import styles from './market-fields.module.css';

export interface MarketDetails {
  name: string;
  unit: string;
  /** null: as the column is called. */
  focalName: string | null;
  rivalName: string | null;
  /** sd of ln users, as text of the list below. */
  focalError: string;
  rivalError: string;
}

export const UNTOUCHED_DETAILS: MarketDetails = {
  name: '',
  unit: 'monthly active users',
  focalName: null,
  rivalName: null,
  focalError: '0',
  rivalError: '0.1',
};

/** Stated measurement errors to choose from: a share of the count, taken as the sd of its logarithm. */
const ERRORS = [
  { value: '0', label: 'counted' },
  { value: '0.02', label: 'within about 2 %' },
  { value: '0.05', label: 'within about 5 %' },
  { value: '0.1', label: 'within about 10 %, like a panel' },
  { value: '0.2', label: 'within about 20 %' },
  { value: '0.3', label: 'within about 30 %, a rough guess' },
];

interface MarketFieldsProps {
  details: MarketDetails;
  /** Names that stand until others are typed. */
  columnNames: { focal: string; rival: string };
  problems: FieldSentences;
  onChange: (details: MarketDetails) => void;
}

export function MarketFields({ details, columnNames, problems, onChange }: MarketFieldsProps) {
  const change = (field: keyof MarketDetails) => (event: { target: { value: string } }) =>
    onChange({ ...details, [field]: event.target.value });
  return (
    <div className={styles.fields}>
      <TextField
        label="Name of the market"
        value={details.name}
        onChange={change('name')}
        problem={problems.name}
        placeholder="Tool lending, Northmere"
      />
      <TextField
        label="What is counted"
        value={details.unit}
        onChange={change('unit')}
        problem={problems.unit}
      />
      <TextField
        label="Focal firm"
        value={details.focalName ?? columnNames.focal}
        onChange={change('focalName')}
        problem={problems.focalName}
      />
      <TextField
        label="Rival"
        value={details.rivalName ?? columnNames.rival}
        onChange={change('rivalName')}
        problem={problems.rivalName}
      />
      <ChoiceField
        label="The focal firm’s counts are"
        options={listErrors(details.focalError)}
        value={details.focalError}
        onChange={change('focalError')}
      />
      <ChoiceField
        label="The rival’s counts are"
        options={listErrors(details.rivalError)}
        value={details.rivalError}
        onChange={change('rivalError')}
        help="Estimates from a panel are often within 10 % (common practice). The bands widen by it."
      />
    </div>
  );
}

/** The choices, with the stored one among them where it is none of ours. */
function listErrors(stored: string): { value: string; label: string }[] {
  if (ERRORS.some((choice) => choice.value === stored)) return ERRORS;
  return [{ value: stored, label: `within about ${Math.round(Number(stored) * 1000) / 10} %` }, ...ERRORS];
}
