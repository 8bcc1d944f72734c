/** The rules of the format on one page: what a file may look like, how cells are read, what is refused; template and sample. */
import type { Metadata } from 'next';
import type { ReactNode } from 'react';
import { PageFrame } from '@/app/_components/frame/page-frame';
import { Question } from '@/app/_components/frame/question';
import { Headline } from '@/app/_components/text/headline';
import { readViewer } from '@/app/_lib/require-viewer';
import { MAX_FILE_BYTES } from '@/app/_lib/upload-limit';
import {
  JUMP_FACTOR,
  MAX_COLUMNS,
  MAX_ROWS,
  MAX_SERIES_MONTHS,
  MIN_MONTHS_TO_FIT,
} from '@/lib/series/limits';
import styles from './page.module.css';

export const metadata: Metadata = { title: 'What a file may look like' };

export default async function FormatPage() {
  const viewer = await readViewer();
  return (
    <PageFrame title="Format" viewer={viewer}>
      <Question id="file" question="What may a file look like?" note={<Limits />} isFirst>
        <Headline support={<Downloads />}>
          One row a month: the month, your users, the rival’s users.
        </Headline>
        <pre className={styles.example}>
          {'Month,Our firm,The rival\n2024-01,120400,88000\n2024-02,123100,\n2024-03,125900,93500'}
        </pre>
        <Rules>
          <li>
            CSV, TSV or text, with commas, semicolons, tabs or bars between the cells; cells with such a mark
            inside in quotes. UTF-8, UTF-16 or Windows-1252.
          </li>
          <li>An Excel workbook (.xlsx) without password and macros; the sheet can be chosen.</li>
          <li>A column for each firm, or a row for each month and firm: month, firm, users.</li>
          <li>More columns and more firms than two do no harm: two are chosen.</li>
          <li>A first row with names. Title lines above it are passed over. Rows in any order.</li>
        </Rules>
      </Question>
      <Question id="months" question="How are months written?">
        <Rules>
          <li>
            2024-03, 2024/03, 03/2024, 202403, Mar 2024, March 2024, März 2024, 2024-03-31, 31.03.2024, and a
            spreadsheet’s day numbers.
          </li>
          <li>
            03/04/2024 can be 3 April or March 4: other dates of the column decide, and where none does you
            are asked once, with both readings shown. The same for years of two digits.
          </li>
          <li>
            Rows can be days or weeks: a month counts as their mean or its last row, as you choose, and a
            month that they do not fill is left out. A quarter (2024-Q1) stands in its last month.
          </li>
          <li>A month without a row is a gap. Gaps are allowed; they make the answer less sure.</li>
        </Rules>
      </Question>
      <Question id="counts" question="How are counts written?">
        <Rules>
          <li>1234, 1,234, 1.234, 1 234, 1’234, 12.5k, 1.2M, 13,75, 1.2E+05.</li>
          <li>
            1,234 can be one thousand or one and a bit: other counts of the column decide, and where none does
            you are asked once.
          </li>
          <li>
            An empty cell, “n/a” or “-” is an unknown month. A zero before the first count means not launched.
          </li>
          <li>
            A zero after the launch, a negative count and a text become gaps. Each is told with its row,
            column and value, and you can choose otherwise.
          </li>
        </Rules>
      </Question>
      <Question id="looks" question="What is looked at twice?">
        <Rules>
          <li>Two rows for one month; months after the current one, and the current one itself; gaps.</li>
          <li>
            A change of more than {JUMP_FACTOR} times in a month; one firm in thousands and the other not.
          </li>
          <li>Two firms with the same counts; counts that always add up to the same, which are shares.</li>
        </Rules>
      </Question>
      <Question id="law" question="What must not be in it?">
        <Rules>
          <li>Personal data: only numbers of users, month by month.</li>
          <li>Figures got by exchange with the rival, or in any other way that the law does not allow.</li>
          <li>Unpublished figures of a listed company may be inside information: ask before you use them.</li>
        </Rules>
      </Question>
    </PageFrame>
  );
}

function Rules({ children }: { children: ReactNode }) {
  return <ul className={styles.rules}>{children}</ul>;
}

function Downloads() {
  return (
    <p>
      <a href="/format/template" download>
        Download a template
      </a>{' '}
      with the months of the last two years, or{' '}
      <a href="/format/sample" download>
        a sample
      </a>{' '}
      with invented counts.
    </p>
  );
}

function Limits() {
  return (
    <>
      <p>
        At least {MIN_MONTHS_TO_FIT} months in which both firms are known, at most {MAX_SERIES_MONTHS} months.
      </p>
      <p>
        Files up to {MAX_FILE_BYTES / 1_000_000} MB, {MAX_ROWS.toLocaleString('en-US')} rows and {MAX_COLUMNS}{' '}
        columns.
      </p>
    </>
  );
}
