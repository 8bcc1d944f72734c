'use client';

/**
 * The main figure: users or share, history and forecast, with a read-out of any month by pointer, touch or arrow keys.
 * The chart is drawn for the size its frame has; its place is reserved, so nothing moves when it comes.
 */
import { useMemo, useState } from 'react';
import { useElementSize } from '@/app/_lib/use-element-size';
import type { ForecastFigure as ForecastFigureData, ForecastRow, ForecastView } from '@/lib/brief/types';
import { ViewSwitch } from '../controls/view-switch';
import { EventList } from './event-list';
import { FigureFrame } from './figure-frame';
import styles from './forecast-figure.module.css';
import { layOutForecast } from './forecast-layout';
import { ForecastPlot } from './forecast-plot';
import { ForecastReadOut } from './forecast-read-out';
import { MonthReader, type MonthReading } from './month-reader';

const VIEWS = [
  { id: 'users', label: 'Users' },
  { id: 'share', label: 'Share' },
] as const;

export function ForecastFigure({ figure }: { figure: ForecastFigureData }) {
  const [viewId, setViewId] = useState<ForecastView['id']>('users');
  const view = figure[viewId];
  const [reading, setReading] = useState<number | null>(null);
  const index = Math.min(reading ?? view.rows.length - 1, view.rows.length - 1);
  return (
    <FigureFrame caption={view.caption} table={view.table}>
      <div className={styles.head}>
        <ViewSwitch label="What the chart counts" views={VIEWS} value={viewId} onChange={setViewId} />
        <p className={styles.axisLabel}>{view.axisLabel}</p>
      </div>
      <ForecastReadOut view={view} index={index} />
      <ForecastCanvas view={view} index={index} isReading={reading !== null} onRead={setReading} />
      <EventList marks={view.events} leftOut={view.leftOut.text} />
    </FigureFrame>
  );
}

interface ForecastCanvasProps {
  view: ForecastView;
  index: number;
  isReading: boolean;
  onRead: (index: number | null) => void;
}

function ForecastCanvas({ view, index, isReading, onRead }: ForecastCanvasProps) {
  const [ref, size] = useElementSize<HTMLDivElement>();
  const readings = useMemo(() => view.rows.map((row) => readRow(view, row)), [view]);
  const layout = size
    ? layOutForecast(
        size,
        view.ticks.map((tick) => tick.label),
        view.series.map((series) => series.end.text),
      )
    : null;
  return (
    <div className={styles.canvas} ref={ref}>
      <div className={styles.picture} role="img" aria-label={view.title}>
        {size && layout ? <ForecastPlot view={view} layout={layout} size={size} /> : null}
      </div>
      {layout ? (
        <MonthReader
          readings={readings}
          monthDomain={view.monthDomain}
          domain={view.domain}
          plot={layout.plot}
          index={index}
          isReading={isReading}
          onRead={onRead}
        />
      ) : null}
    </div>
  );
}

function readRow(view: ForecastView, row: ForecastRow): MonthReading {
  const spelt = view.series.map(({ key, name }) => `${name} ${row.points[key]?.text || 'no count'}`);
  const marks = view.series.flatMap(({ key, tone }) => {
    const value = row.points[key]?.seen ?? row.points[key]?.mid ?? null;
    return value === null ? [] : [{ key, tone, value }];
  });
  return { month: row.month, text: `${row.label}: ${spelt.join('; ')}`, marks };
}
