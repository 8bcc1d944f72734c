'use client';

/** The layers of the odds map over its axes: the four quarters, the two lines that part them, and their names. */
import { usePlotArea, useXAxisScale, useYAxisScale, ZIndexLayer } from 'recharts';
import { markColour, textColour } from '@/app/_lib/tone';
import type { OddsMap, OddsQuarter } from '@/lib/brief/types';
import styles from './map.module.css';
import { ABOVE_MARKS, wrapWords } from './map-layout';

const PADDING = 9;
const LINE_HEIGHT = 16;
const BASELINE = 12;

export function OddsQuarters({ map }: { map: OddsMap }) {
  const scaleX = useXAxisScale();
  const scaleY = useYAxisScale();
  if (!scaleX || !scaleY) return null;
  return map.quarters
    .filter((quarter) => quarter.isDecided)
    .map((quarter) => {
      const [left, right] = quarter.x.map((value) => scaleX(value) ?? 0) as [number, number];
      const [bottom, top] = quarter.y.map((value) => scaleY(value) ?? 0) as [number, number];
      return (
        <rect
          key={quarter.outcome}
          x={left}
          y={top}
          width={right - left}
          height={bottom - top}
          fill={markColour(quarter.tone)}
          fillOpacity={0.09}
        />
      );
    });
}

export function OddsLines({ map }: { map: OddsMap }) {
  const frame = usePlotArea();
  const x = useXAxisScale()?.(1);
  const y = useYAxisScale()?.(1);
  if (!frame || x === undefined || y === undefined) return null;
  return (
    <ZIndexLayer zIndex={ABOVE_MARKS}>
      <line x1={x} x2={x} y1={frame.y} y2={frame.y + frame.height} className={styles.cross} />
      <line x1={frame.x} x2={frame.x + frame.width} y1={y} y2={y} className={styles.cross} />
      {map.quarters.map((quarter) => (
        <QuarterName key={quarter.outcome} quarter={quarter} map={map} />
      ))}
    </ZIndexLayer>
  );
}

/** Stands in the outer corner of its quarter, as far from the cloud as it can. */
function QuarterName({ quarter, map }: { quarter: OddsQuarter; map: OddsMap }) {
  const frame = usePlotArea();
  if (!frame) return null;
  const isRight = quarter.x[1] >= map.domain.x[1];
  const isTop = quarter.y[1] >= map.domain.y[1];
  const lines = cutLabel(quarter.label, frame.width / 2 - 2 * PADDING);
  const x = isRight ? frame.x + frame.width - PADDING : frame.x + PADDING;
  const top = isTop
    ? frame.y + PADDING + BASELINE
    : frame.y + frame.height - PADDING - (lines.length - 1) * LINE_HEIGHT;
  return (
    <text
      textAnchor={isRight ? 'end' : 'start'}
      fill={textColour(quarter.tone)}
      className={styles.quarterName}
    >
      {lines.map((line, index) => (
        <tspan key={line} x={x} y={top + index * LINE_HEIGHT}>
          {line}
        </tspan>
      ))}
    </text>
  );
}

/** "both stay · 88 %" on one line, or the name and then its chance. */
function cutLabel(label: string, width: number): string[] {
  const whole = wrapWords(label, width);
  return whole.length === 1 ? whole : label.split(' · ').flatMap((part) => wrapWords(part, width));
}
