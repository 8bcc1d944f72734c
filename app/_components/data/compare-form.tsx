/** Chooses the revision to compare with. A plain form, so that it works before scripts load. */
import { Button } from '../controls/button';
import { ChoiceField } from '../controls/choice-field';
import styles from './compare-form.module.css';

interface CompareFormProps {
  /** Numbers of the other revisions, newest first. */
  others: number[];
  chosen: number | null;
}

export function CompareForm({ others, chosen }: CompareFormProps) {
  return (
    <form className={styles.form} action="#changes">
      <ChoiceField
        label="Compared with"
        name="against"
        defaultValue={chosen ?? undefined}
        options={others.map((number) => ({ value: String(number), label: `revision ${number}` }))}
      />
      <Button type="submit">Compare</Button>
    </form>
  );
}
