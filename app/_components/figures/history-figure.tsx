'use client';

/** The counts of a series as a chart with the firms' names beside their samples, its marks in words, and a table of months. */
import dynamic from 'next/dynamic';
import { type ReactNode, useMemo } from 'react';
import { LOCALE } from '@/app/_lib/locale';
import { useElementSize } from '@/app/_lib/use-element-size';
import { type EventFact, markEvents, tellExclusions } from '@/lib/brief/event-marks';
import { createMonthFormat } from '@/lib/brief/month-words';
import type { Exclusion } from '@/lib/series/exclusions';
import type { MonthlySeries } from '@/lib/series/types';
import { EventList } from './event-list';
import styles from './history-figure.module.css';
import { MonthTable } from './month-table';
import { SeriesSample } from './series-sample';

const HistoryPlot = dynamic(() => import('./history-plot').then((module) => module.HistoryPlot), {
  ssr: false,
});

const months = createMonthFormat(LOCALE);

interface HistoryFigureProps {
  series: MonthlySeries;
  exclusions?: readonly Exclusion[];
  events?: readonly EventFact[];
  focalName: string;
  rivalName: string;
  unit: string;
  /** In the place of the table of months. */
  children?: ReactNode;
}

export function HistoryFigure({
  series,
  exclusions = [],
  events = [],
  focalName,
  rivalName,
  unit,
  children,
}: HistoryFigureProps) {
  const [ref, size] = useElementSize<HTMLDivElement>();
  const marks = useMemo(() => markEvents(events, months), [events]);
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
          {size ? <HistoryPlot series={series} exclusions={exclusions} marks={marks} size={size} /> : null}
        </div>
      </div>
      <EventList marks={marks} leftOut={tellExclusions(exclusions, months)} />
      {children ?? (
        <MonthTable series={series} exclusions={exclusions} focalName={focalName} rivalName={rivalName} />
      )}
    </figure>
  );
}

function capitalise(text: string): string {
  return text.charAt(0).toUpperCase() + text.slice(1);
}
