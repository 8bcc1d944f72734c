'use client';

/** Which column is the month, which the focal firm's count, which the rival's; and how to read a table that could be read two ways. */
import type { DateOrder, DecimalMark, SeriesMapping, SeriesProblem } from '@/lib/series/types';
import { ChoiceField } from '../controls/choice-field';
import styles from './columns-step.module.css';
import { TableSample } from './table-sample';
import type { Understood } from './understand';

interface ColumnsStepProps {
  understood: Understood;
  mapping: SeriesMapping;
  onChange: (mapping: SeriesMapping) => void;
}

const DECIMAL_MARKS = [
  { value: '', label: 'as the cells tell' },
  { value: 'point', label: 'a point: 1,234.5' },
  { value: 'comma', label: 'a comma: 1.234,5' },
];

const DATE_ORDERS = [
  { value: '', label: 'as the cells tell' },
  { value: 'day-first', label: 'day first: 31/01/2024' },
  { value: 'month-first', label: 'month first: 01/31/2024' },
];

export function ColumnsStep({ understood, mapping, onChange }: ColumnsStepProps) {
  const { problems } = understood.reading;
  const options = understood.header.map((name) => ({ value: name, label: name }));
  const isDateOpen = mapping.dateOrder !== undefined || hasCode(problems, 'month-ambiguous');
  const isMarkOpen = mapping.decimalMark !== undefined || hasCode(problems, 'count-ambiguous');
  return (
    <>
      <TableSample understood={understood} mapping={mapping} />
      <div className={styles.columns}>
        <ChoiceField
          label="Month"
          value={mapping.month}
          options={options}
          onChange={(event) => onChange({ ...mapping, month: event.target.value })}
        />
        <ChoiceField
          label="Focal firm: whose side the brief takes"
          value={mapping.focal}
          options={options}
          onChange={(event) => onChange({ ...mapping, focal: event.target.value })}
        />
        <ChoiceField
          label="Rival"
          value={mapping.rival}
          options={options}
          onChange={(event) => onChange({ ...mapping, rival: event.target.value })}
        />
        {isDateOpen ? (
          <ChoiceField
            label="Dates are written with"
            value={mapping.dateOrder ?? ''}
            options={DATE_ORDERS}
            onChange={(event) =>
              onChange({ ...mapping, dateOrder: (event.target.value || undefined) as DateOrder })
            }
          />
        ) : null}
        {isMarkOpen ? (
          <ChoiceField
            label="Fractions are written with"
            value={mapping.decimalMark ?? ''}
            options={DECIMAL_MARKS}
            onChange={(event) =>
              onChange({ ...mapping, decimalMark: (event.target.value || undefined) as DecimalMark })
            }
          />
        ) : null}
      </div>
    </>
  );
}

function hasCode(problems: SeriesProblem[], code: SeriesProblem['code']): boolean {
  return problems.some((problem) => problem.code === code);
}
