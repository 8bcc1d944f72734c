'use client';

/**
 * A transparent layer over a chart's plot that reads one month: move the pointer, drag on touch, or focus it and use the
 * arrow keys. To assistive technology it is a slider whose value is the month and everything known about it.
 */
import { type KeyboardEvent, type PointerEvent, useId } from 'react';
import { markColour } from '@/app/_lib/tone';
import type { Tone } from '@/lib/brief/types';
import { type PlotBox, placeOn } from './forecast-layout';
import styles from './month-reader.module.css';

const MONTHS_PER_PAGE = 12;

/** One month as it is read: `text` in full, and the values to mark. */
export interface MonthReading {
  month: number;
  text: string;
  marks: { key: string; tone: Tone; value: number }[];
}

interface MonthReaderProps {
  readings: MonthReading[];
  monthDomain: [number, number];
  domain: [number, number];
  plot: PlotBox;
  index: number;
  isReading: boolean;
  onRead: (index: number | null) => void;
}

export function MonthReader({
  readings,
  monthDomain,
  domain,
  plot,
  index,
  isReading,
  onRead,
}: MonthReaderProps) {
  const hintId = useId();
  const last = readings.length - 1;
  const reading = readings[index];

  function readPointer(event: PointerEvent<HTMLDivElement>) {
    const box = event.currentTarget.getBoundingClientRect();
    const fraction = (event.clientX - box.left) / box.width;
    const month = monthDomain[0] + fraction * (monthDomain[1] - monthDomain[0]);
    const nearest = Math.round(month - readings[0]!.month);
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
      aria-valuetext={reading?.text}
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
      {isReading && reading ? (
        <ReadingMarks reading={reading} monthDomain={monthDomain} domain={domain} plot={plot} />
      ) : null}
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

type ReadingMarksProps = Pick<MonthReaderProps, 'monthDomain' | 'domain' | 'plot'> & {
  reading: MonthReading;
};

function ReadingMarks({ reading, monthDomain, domain, plot }: ReadingMarksProps) {
  const x = placeOn(monthDomain, 0, plot.width, reading.month);
  return (
    <svg width={plot.width} height={plot.height} className={styles.marks} aria-hidden="true">
      <line x1={x} x2={x} y1={0} y2={plot.height} className={styles.line} />
      {reading.marks.map(({ key, tone, value }) => (
        <circle
          key={key}
          cx={x}
          cy={placeOn(domain, plot.height, 0, value)}
          r={4.5}
          fill={markColour(tone)}
          stroke="var(--paper)"
          strokeWidth={1.5}
        />
      ))}
    </svg>
  );
}
