'use client';

/** The counts of a series as a chart with the firms' names beside their samples, and as a table of months. */
import dynamic from 'next/dynamic';
import { listMonths } from '@/app/_lib/list-months';
import { LOCALE } from '@/app/_lib/locale';
import { useElementSize } from '@/app/_lib/use-element-size';
import { createMonthFormat } from '@/lib/brief/month-words';
import type { MonthlySeries } from '@/lib/series/types';
import styles from './history-figure.module.css';
import { SeriesSample } from './series-sample';

const HistoryPlot = dynamic(() => import('./history-plot').then((module) => module.HistoryPlot), {
  ssr: false,
});

interface HistoryFigureProps {
  series: MonthlySeries;
  focalName: string;
  rivalName: string;
  unit: string;
}

export function HistoryFigure({ series, focalName, rivalName, unit }: HistoryFigureProps) {
  const [ref, size] = useElementSize<HTMLDivElement>();
  return (
    <figure>
      <p className={styles.names}>
        <span>
          <SeriesSample tone="focal" isDashed={false} marker="round" /> {focalName}
        </span>
        <span>
          <SeriesSample tone="rival" isDashed marker="square-open" /> {rivalName}
        </span>
      </p>
      <div className={styles.canvas} ref={ref}>
        <div
          className={styles.picture}
          role="img"
          aria-label={`${capitalise(unit)} of ${focalName} and ${rivalName} by month`}
        >
          {size ? <HistoryPlot series={series} size={size} /> : null}
        </div>
      </div>
      <MonthTable series={series} focalName={focalName} rivalName={rivalName} />
    </figure>
  );
}

function capitalise(text: string): string {
  return text.charAt(0).toUpperCase() + text.slice(1);
}

function MonthTable({ series, focalName, rivalName }: Omit<HistoryFigureProps, 'unit'>) {
  const months = createMonthFormat(LOCALE);
  const counts = new Intl.NumberFormat(LOCALE, { maximumFractionDigits: 1 });
  const rows = listMonths(series);
  const spell = (count: number | null) => (count === null ? 'no count' : counts.format(count));
  return (
    // biome-ignore lint/a11y/noNoninteractiveTabindex: a frame that scrolls must be reachable by keyboard
    <section className={styles.scroller} aria-label="Counts by month" tabIndex={0}>
      <table className={styles.table}>
        <thead>
          <tr>
            <th scope="col">Month</th>
            <th scope="col">{focalName}</th>
            <th scope="col">{rivalName}</th>
          </tr>
        </thead>
        <tbody>
          {rows.map(({ month, focal, rival }) => (
            <tr key={month}>
              <th scope="row">{months.short(month)}</th>
              <td>{spell(focal)}</td>
              <td>{spell(rival)}</td>
            </tr>
          ))}
        </tbody>
      </table>
    </section>
  );
}
