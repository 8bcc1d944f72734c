'use client';

/**
 * A transparent layer over a chart's plot that reads one month: move the pointer, drag on touch, or focus it and use the
 * arrow keys. To assistive technology it is a slider whose value is the month and everything known about it.
 */
import { type KeyboardEvent, type PointerEvent, useId } from 'react';
import { markColour } from '@/app/_lib/tone';
import type { ForecastView } from '@/lib/brief/types';
import { type PlotBox, placeOn } from './forecast-layout';
import styles from './month-reader.module.css';

const MONTHS_PER_PAGE = 12;

interface MonthReaderProps {
  view: Pick<ForecastView, 'rows' | 'series' | 'domain' | 'monthDomain'>;
  plot: PlotBox;
  index: number;
  isReading: boolean;
  onRead: (index: number | null) => void;
}

export function MonthReader({ view, plot, index, isReading, onRead }: MonthReaderProps) {
  const hintId = useId();
  const last = view.rows.length - 1;
  const row = view.rows[index];

  function readPointer(event: PointerEvent<HTMLDivElement>) {
    const box = event.currentTarget.getBoundingClientRect();
    const fraction = (event.clientX - box.left) / box.width;
    const month = view.monthDomain[0] + fraction * (view.monthDomain[1] - view.monthDomain[0]);
    const nearest = Math.round(month - view.rows[0]!.month);
    onRead(Math.min(Math.max(nearest, 0), last));
  }

  function readKey(event: KeyboardEvent<HTMLDivElement>) {
    const target = targetOfKey(event.key, index, last);
    if (target === undefined) return;
    event.preventDefault();
    onRead(target);
  }

  return (
    <div
      className={styles.reader}
      style={{ left: plot.x, top: plot.y, width: plot.width, height: plot.height }}
      role="slider"
      tabIndex={0}
      aria-label="Month to read"
      aria-describedby={hintId}
      aria-valuemin={0}
      aria-valuemax={last}
      aria-valuenow={index}
      aria-valuetext={row ? spellRow(view.series, row) : undefined}
      aria-orientation="horizontal"
      onPointerMove={readPointer}
      onPointerDown={readPointer}
      onPointerLeave={() => onRead(null)}
      onKeyDown={readKey}
      onBlur={() => onRead(null)}
      data-screen-only
    >
      <span id={hintId} hidden>
        Arrow keys move by a month, page keys by a year, Escape leaves.
      </span>
      {isReading && row ? <ReadingMarks view={view} plot={plot} row={row} /> : null}
    </div>
  );
}

/** undefined: not a key of ours; null: stop reading. */
function targetOfKey(key: string, index: number, last: number): number | null | undefined {
  const clamp = (value: number) => Math.min(Math.max(value, 0), last);
  switch (key) {
    case 'ArrowRight':
    case 'ArrowUp':
      return clamp(index + 1);
    case 'ArrowLeft':
    case 'ArrowDown':
      return clamp(index - 1);
    case 'PageUp':
      return clamp(index + MONTHS_PER_PAGE);
    case 'PageDown':
      return clamp(index - MONTHS_PER_PAGE);
    case 'Home':
      return 0;
    case 'End':
      return last;
    case 'Escape':
      return null;
    default:
      return undefined;
  }
}

function spellRow(series: ForecastView['series'], row: ForecastView['rows'][number]): string {
  const parts = series.map(({ key, name }) => `${name} ${row.points[key]?.text || 'no count'}`);
  return `${row.label}: ${parts.join('; ')}`;
}

function ReadingMarks({
  view,
  plot,
  row,
}: Pick<MonthReaderProps, 'view' | 'plot'> & { row: ForecastView['rows'][number] }) {
  const x = placeOn(view.monthDomain, 0, plot.width, row.month);
  return (
    <svg width={plot.width} height={plot.height} className={styles.marks} aria-hidden="true">
      <line x1={x} x2={x} y1={0} y2={plot.height} className={styles.line} />
      {view.series.map(({ key, tone }) => {
        const value = row.points[key]?.seen ?? row.points[key]?.mid;
        if (value === null || value === undefined) return null;
        const y = placeOn(view.domain, plot.height, 0, value);
        return (
          <circle
            key={key}
            cx={x}
            cy={y}
            r={4.5}
            fill={markColour(tone)}
            stroke="var(--paper)"
            strokeWidth={1.5}
          />
        );
      })}
    </svg>
  );
}
