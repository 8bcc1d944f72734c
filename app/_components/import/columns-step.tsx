'use client';

/** Which sheet and which columns are read, how rows become months, and the questions that the cells leave open. */
import type { Aggregation, SeriesMapping } from '@/lib/series/types';
import { ChoiceField } from '../controls/choice-field';
import { AmbiguityQuestions } from './ambiguity-questions';
import styles from './columns-step.module.css';
import { TableSample } from './table-sample';
import type { ReadingChoices, Understood } from './understood';

interface ColumnsStepProps {
  understood: Understood;
  onChoose: (choices: ReadingChoices) => void;
}

const LAYOUTS = [
  { value: 'wide', label: 'a column for each firm' },
  { value: 'long', label: 'a row for each month and firm' },
];

const AGGREGATIONS: { value: Aggregation; label: string }[] = [
  { value: 'mean', label: 'the mean of its rows' },
  { value: 'last', label: 'its last row' },
];

export function ColumnsStep({ understood, onChoose }: ColumnsStepProps) {
  const { sheets, sheet, mapping, reading } = understood;
  const change = (changes: Partial<SeriesMapping>) =>
    onChoose({ sheet, mapping: mapping && { ...mapping, ...changes } });
  const isFine = reading.grain === 'day' || reading.grain === 'week';
  return (
    <>
      {sheets.length > 1 ? (
        <div className={styles.columns}>
          <ChoiceField
            label="Sheet"
            value={String(sheet)}
            options={sheets.map((name, index) => ({ value: String(index), label: name }))}
            onChange={(event) => onChoose({ sheet: Number(event.target.value), mapping: null })}
          />
        </div>
      ) : null}
      {mapping ? (
        <>
          <TableSample understood={understood} mapping={mapping} />
          <div className={styles.columns}>
            <ColumnChoices understood={understood} mapping={mapping} onChange={change} />
            {isFine ? (
              <ChoiceField
                label={`The rows are ${reading.grain === 'day' ? 'days' : 'weeks'}. A month counts as`}
                value={mapping.aggregation ?? 'mean'}
                options={AGGREGATIONS}
                onChange={(event) => change({ aggregation: event.target.value as Aggregation })}
              />
            ) : null}
          </div>
          <AmbiguityQuestions problems={reading.problems} mapping={mapping} onChange={change} />
        </>
      ) : null}
    </>
  );
}

interface ColumnChoicesProps {
  understood: Understood;
  mapping: SeriesMapping;
  onChange: (changes: Partial<SeriesMapping>) => void;
}

function ColumnChoices({ understood, mapping, onChange }: ColumnChoicesProps) {
  const { header, firms } = understood;
  const { long } = mapping;
  const columns = header.map((name) => ({ value: name, label: name }));
  const choices = long ? firms.map((name) => ({ value: name, label: name })) : columns;
  return (
    <>
      <ChoiceField
        label="Layout"
        value={long ? 'long' : 'wide'}
        options={LAYOUTS}
        onChange={(event) => onChange(changeLayout(header, mapping, event.target.value === 'long'))}
      />
      <ChoiceField
        label="Month"
        value={mapping.month}
        options={columns}
        onChange={(event) => onChange({ month: event.target.value })}
      />
      {long ? (
        <>
          <ChoiceField
            label="Names of the firms"
            value={long.firm}
            options={columns}
            onChange={(event) =>
              onChange({ long: { ...long, firm: event.target.value }, focal: '', rival: '' })
            }
          />
          <ChoiceField
            label="Users"
            value={long.users}
            options={columns}
            onChange={(event) => onChange({ long: { ...long, users: event.target.value } })}
          />
        </>
      ) : null}
      <ChoiceField
        label="Focal firm: whose side the brief takes"
        value={mapping.focal}
        options={choices}
        onChange={(event) => onChange({ focal: event.target.value })}
      />
      <ChoiceField
        label="Rival"
        value={mapping.rival}
        options={choices}
        onChange={(event) => onChange({ rival: event.target.value })}
      />
    </>
  );
}

/** Another layout starts from the columns in their order; choices about single problems were of the other layout. */
function changeLayout(header: string[], { month }: SeriesMapping, isLong: boolean): Partial<SeriesMapping> {
  const [first, second] = header.filter((name) => name !== month);
  return isLong
    ? { long: { firm: first!, users: second! }, focal: '', rival: '', fixes: undefined }
    : { long: undefined, focal: first, rival: second, fixes: undefined };
}
