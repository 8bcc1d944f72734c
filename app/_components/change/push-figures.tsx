'use client';

/** The two figures of a push: the forecast with and without it, and the difference that it makes. */
import dynamic from 'next/dynamic';
import { memo, useMemo, useState } from 'react';
import { useElementSize } from '@/app/_lib/use-element-size';
import { sentence } from '@/lib/brief/text';
import type { DifferenceView, PushBrief } from '@/lib/brief/types';
import { ViewSwitch } from '../controls/view-switch';
import { FigureFrame } from '../figures/figure-frame';
import { MonthReader, type MonthReading } from '../figures/month-reader';
import { SeriesSample } from '../figures/series-sample';
import styles from './change.module.css';
import { placeDifferencePlot } from './difference-plot-box';

const PushPlot = dynamic(() => import('../figures/plots').then((module) => module.PushPlot), { ssr: false });
const DifferencePlot = dynamic(() => import('../figures/plots').then((module) => module.DifferencePlot), {
  ssr: false,
});

const VIEWS = [
  { id: 'share', label: 'Share' },
  { id: 'users', label: 'Users' },
] as const;

/** Drawn anew only for another push brief: while a slider moves, the controls are drawn more often than the figures. */
export const PushFigures = memo(function PushFigures({ push }: { push: PushBrief }) {
  const [viewId, setViewId] = useState<'users' | 'share'>('share');
  const view = push.difference[viewId];
  return (
    <div className={styles.figures}>
      <ViewSwitch label="What the two charts count" views={VIEWS} value={viewId} onChange={setViewId} />
      <div className={styles.pair}>
        <PushFigure push={push} view={view} isShare={viewId === 'share'} />
        <DifferenceFigure view={view} push={push} />
      </div>
    </div>
  );
});

interface PushFigureProps {
  push: PushBrief;
  view: DifferenceView;
  isShare: boolean;
}

function PushFigure({ push, view, isShare }: PushFigureProps) {
  const [ref, size] = useElementSize<HTMLDivElement>();
  const rows = isShare ? push.share : push.users;
  return (
    <FigureFrame caption={PUSHED_CAPTION} table={push.checkpoints} isLive>
      <h3 className={styles.figureName}>With the push</h3>
      <SeriesNames series={view.series} />
      <div className={styles.canvas} ref={ref}>
        <div
          className={styles.picture}
          role="img"
          aria-label={`${view.series.map((line) => line.name).join(' and ')} with the push and without it`}
        >
          {size ? (
            <PushPlot
              rows={rows}
              series={view.series}
              isShare={isShare}
              monthDomain={view.monthDomain}
              monthTicks={view.monthTicks}
              size={size}
            />
          ) : null}
        </div>
      </div>
    </FigureFrame>
  );
}

function SeriesNames({ series }: { series: DifferenceView['series'] }) {
  return (
    <p className={styles.names}>
      {series.map(({ key, name, tone, isDashed }) => (
        <span key={key}>
          <SeriesSample tone={tone} isDashed={isDashed} marker="none" /> {name}
        </span>
      ))}
      <span>
        <svg width={26} height={10} aria-hidden="true">
          <line
            x1={0}
            x2={26}
            y1={5}
            y2={5}
            stroke="var(--ink-2)"
            strokeWidth={1.25}
            strokeDasharray="1.5 3"
          />
        </svg>{' '}
        without the push
      </span>
    </p>
  );
}

function DifferenceFigure({ view, push }: { view: DifferenceView; push: PushBrief }) {
  const [ref, size] = useElementSize<HTMLDivElement>();
  const [reading, setReading] = useState<number | null>(null);
  const readings = useMemo(() => view.rows.map((row) => readRow(view, row)), [view]);
  const last = readings.length - 1;
  const index = Math.min(reading ?? last, last);
  return (
    <FigureFrame caption={push.caption} table={view.table} isLive>
      <h3 className={styles.figureName}>The difference it makes</h3>
      <p className={styles.names}>{readings[index]?.text}</p>
      <div className={styles.canvas} ref={ref}>
        <div
          className={styles.picture}
          role="img"
          aria-label={`Difference that the push makes. ${push.plain}`}
        >
          {size ? <DifferencePlot view={view} size={size} /> : null}
        </div>
        {size ? (
          <MonthReader
            readings={readings}
            monthDomain={view.monthDomain}
            domain={view.domain}
            plot={placeDifferencePlot(size)}
            index={index}
            isReading={reading !== null}
            onRead={setReading}
          />
        ) : null}
      </div>
    </FigureFrame>
  );
}

const PUSHED_CAPTION = sentence(
  'Line and band: with the push, nine in ten. Thin line: the middle without it.',
);

function readRow(view: DifferenceView, row: DifferenceView['rows'][number]): MonthReading {
  const spelt = view.series.map(({ key, name }) => `${name} ${row.points[key]?.text ?? ''}`);
  const marks = view.series.flatMap(({ key, tone }) => {
    const value = row.points[key]?.mid;
    return value === undefined ? [] : [{ key, tone, value }];
  });
  return { month: row.month, text: `${row.label}: ${spelt.join('; ')}`, marks };
}
