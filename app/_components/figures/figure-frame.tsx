/**
 * The frame of every figure: the plot, a caption that says what it shows in this market, and the numbers as a table
 * behind a disclosure, to be saved as files. The plot names itself to a screen reader; the table is its long form.
 */
import type { ReactNode } from 'react';
import { plainText } from '@/lib/brief/text';
import type { FigureTable, Sentence } from '@/lib/brief/types';
import { SentenceText } from '../text/sentence-text';
import { FigureFiles } from './figure-files';
import styles from './figure-frame.module.css';
import { NumbersTable } from './numbers-table';

interface FigureFrameProps {
  caption: Sentence;
  /** null: the figure shows its numbers itself. */
  table: FigureTable | null;
  /** The figure follows a slider. */
  isLive?: boolean;
  /** false: the figure is made of text and bars, there is no drawing to save. */
  isDrawn?: boolean;
  children: ReactNode;
}

export function FigureFrame({ caption, table, isLive = false, isDrawn = true, children }: FigureFrameProps) {
  return (
    <figure className={styles.figure}>
      {children}
      <figcaption className={styles.caption}>
        <SentenceText sentence={caption} />
      </figcaption>
      {table ? (
        <>
          <NumbersTable table={table} isLive={isLive} />
          <FigureFiles table={table} description={plainText(caption)} isDrawn={isDrawn} />
        </>
      ) : null}
    </figure>
  );
}
