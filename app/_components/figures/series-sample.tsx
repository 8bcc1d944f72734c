/** A short piece of a series' line with its mark, to stand beside its name. */
import { markColour } from '@/app/_lib/tone';
import type { ForecastSeries } from '@/lib/brief/types';

export function SeriesSample({
  tone,
  isDashed,
  marker,
}: Pick<ForecastSeries, 'tone' | 'isDashed' | 'marker'>) {
  const colour = markColour(tone);
  return (
    <svg width={26} height={10} aria-hidden="true">
      <line
        x1={0}
        x2={26}
        y1={5}
        y2={5}
        stroke={colour}
        strokeWidth={2}
        strokeDasharray={isDashed ? '5 3' : undefined}
      />
      {marker === 'square-open' ? (
        <rect x={10} y={2} width={6} height={6} fill="var(--paper)" stroke={colour} strokeWidth={1.25} />
      ) : null}
      {marker === 'round' ? <circle cx={13} cy={5} r={3} fill={colour} /> : null}
    </svg>
  );
}
