'use client';

/** What the table does not say: the market's name, what is counted, the firms' names, how exact each count is, who could be reached. */
import type { FieldSentences } from '@/app/_lib/explain-field';
import { readCountText } from '@/lib/series/number';
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
  /** How many could use such a product at all, as typed; empty: not estimated. */
  focalAddressable: string;
  rivalAddressable: string;
  /** One sd of both, as a share of them, as text of a list below. */
  addressableError: string;
}

export const UNTOUCHED_DETAILS: MarketDetails = {
  name: '',
  unit: 'monthly active users',
  focalName: null,
  rivalName: null,
  focalError: '0',
  rivalError: '0.1',
  focalAddressable: '',
  rivalAddressable: '',
  addressableError: '0.5',
};

/** The fields as the services take them; a text that is no count of users is sent as what no field accepts. */
export function readDetails(details: MarketDetails) {
  const readUsers = (text: string) => {
    const reading = readCountText(text);
    if (reading.kind === 'missing') return null;
    return reading.kind === 'count' ? reading.value : Number.NaN;
  };
  return {
    name: details.name,
    unit: details.unit,
    focalError: Number(details.focalError),
    rivalError: Number(details.rivalError),
    focalAddressable: readUsers(details.focalAddressable),
    rivalAddressable: readUsers(details.rivalAddressable),
    addressableError: Number(details.addressableError),
  };
}

/** Stated measurement errors to choose from: a share of the count, taken as the sd of its logarithm. */
const ERRORS = [
  { value: '0', label: 'counted' },
  { value: '0.02', label: 'within about 2 %' },
  { value: '0.05', label: 'within about 5 %' },
  { value: '0.1', label: 'within about 10 %, like a panel' },
  { value: '0.2', label: 'within about 20 %' },
  { value: '0.3', label: 'within about 30 %, a rough guess' },
];

/** How sure the estimate of the addressable market is: one sd of it as a share, with what that means two times in three. */
const ADDRESSABLE_ERRORS = [
  { value: '0.1', label: 'within about 10 %' },
  { value: '0.25', label: 'within about 25 %' },
  { value: '0.5', label: 'half more or a third less' },
  { value: '1', label: 'twice or half of it' },
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
        options={withStored(ERRORS, details.focalError)}
        value={details.focalError}
        onChange={change('focalError')}
      />
      <ChoiceField
        label="The rival’s counts are"
        options={withStored(ERRORS, details.rivalError)}
        value={details.rivalError}
        onChange={change('rivalError')}
        help="Estimates from a panel are often within 10 % (common practice). The bands widen by it."
      />
      <TextField
        label="How many could use the focal firm’s product at all"
        value={details.focalAddressable}
        onChange={change('focalAddressable')}
        problem={problems.focalAddressable}
        placeholder="not estimated"
        inputMode="decimal"
        help="In the same unit as the counts. Empty: only the counts tell how large the market can grow."
      />
      <TextField
        label="How many could use the rival’s product at all"
        value={details.rivalAddressable}
        onChange={change('rivalAddressable')}
        problem={problems.rivalAddressable}
        placeholder="not estimated"
        inputMode="decimal"
      />
      {details.focalAddressable.trim() || details.rivalAddressable.trim() ? (
        <ChoiceField
          label="How sure these two are"
          options={withStored(ADDRESSABLE_ERRORS, details.addressableError)}
          value={details.addressableError}
          onChange={change('addressableError')}
        />
      ) : null}
    </div>
  );
}

type Choices = { value: string; label: string }[];

/** The choices, with the stored one among them where it is none of ours. */
function withStored(choices: Choices, stored: string): Choices {
  if (choices.some((choice) => choice.value === stored)) return choices;
  return [{ value: stored, label: `within about ${Math.round(Number(stored) * 1000) / 10} %` }, ...choices];
}
