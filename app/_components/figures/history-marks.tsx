'use client';

/** Marks on the chart of counts: events as lettered lines, months left out of the fit as crosses. */
import { usePlotArea, useXAxisScale, useYAxisScale } from 'recharts';
import type { EventMark } from '@/lib/brief/event-marks';
import { Cross, EventLine } from './mark-shapes';

export function EventLines({ marks }: { marks: EventMark[] }) {
  const scale = useXAxisScale();
  const plot = usePlotArea();
  if (!scale || !plot) return null;
  return marks.map((mark) => {
    const x = scale(mark.month);
    const isInside = x !== undefined && x >= plot.x - 0.5 && x <= plot.x + plot.width + 0.5;
    return isInside ? <EventLine key={mark.letter} mark={mark} x={x} plot={plot} /> : null;
  });
}

export interface LeftOutMonth {
  month: number;
  focal: number | null;
  rival: number | null;
}

export function LeftOutCounts({ months }: { months: LeftOutMonth[] }) {
  const scaleX = useXAxisScale();
  const scaleY = useYAxisScale();
  if (!scaleX || !scaleY) return null;
  return months.flatMap(({ month, ...counts }) =>
    (['focal', 'rival'] as const).map((firm) => {
      const count = counts[firm];
      const [x, y] = [scaleX(month), count === null ? undefined : scaleY(count)];
      if (x === undefined || y === undefined) return null;
      return <Cross key={`${month}-${firm}`} x={x} y={y} colour={`var(--${firm})`} />;
    }),
  );
}
