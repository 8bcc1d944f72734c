/**
 * The forecast chart as plain SVG from rows that `lib/brief` prepared: the first thing a reader sees, so it waits for no chart library.
 * The focal firm has a solid line, round marks and plain bands; the rival a dashed line, open squares and hatched bands.
 */
import { useId } from 'react';
import { markColour } from '@/app/_lib/tone';
import type { ForecastSeries, ForecastView } from '@/lib/brief/types';
import styles from './forecast-figure.module.css';
import { type ForecastLayout, placeOn } from './forecast-layout';
import { EventMarks, ForecastAxes, ForecastFromLine, LeftOutMarks, LineEndNames } from './forecast-marks';
import { bandPath, linePath, type PlotScale, readPlaces } from './forecast-paths';
import { HatchPattern } from './hatch-pattern';

/** Marks closer than this (pixels) are drawn smaller. */
const CROWDED_BELOW = 7;
const DASH = '7 4';

interface ForecastPlotProps {
  view: ForecastView;
  layout: ForecastLayout;
  size: { width: number; height: number };
}

export function ForecastPlot({ view, layout, size }: ForecastPlotProps) {
  const id = useId();
  const { plot } = layout;
  const scale: PlotScale = {
    x: (month) => placeOn(view.monthDomain, plot.x, plot.x + plot.width, month),
    y: (value) => placeOn(view.domain, plot.y + plot.height, plot.y, value),
  };
  const months = view.monthDomain[1] - view.monthDomain[0];
  const isCrowded = plot.width / months < CROWDED_BELOW;
  const drawn = view.series.map((series) => ({ series, hatch: `${id}-${series.key}` }));
  return (
    <svg width={size.width} height={size.height} viewBox={`0 0 ${size.width} ${size.height}`} aria-hidden>
      <defs>
        <clipPath id={`${id}-plot`}>
          <rect x={plot.x} y={plot.y} width={plot.width} height={plot.height} />
        </clipPath>
        {drawn
          .filter(({ series }) => series.isHatched)
          .map(({ series, hatch }) => (
            <HatchPattern key={series.key} id={hatch} tone={series.tone} />
          ))}
      </defs>
      <ForecastAxes view={view} layout={layout} scale={scale} />
      <g clipPath={`url(#${id}-plot)`}>
        {drawn.map(({ series, hatch }) => (
          <Bands key={series.key} view={view} series={series} scale={scale} hatch={`url(#${hatch})`} />
        ))}
      </g>
      <EventMarks marks={view.events} plot={plot} scale={scale} />
      <ForecastFromLine mark={view.forecastFrom} plot={plot} scale={scale} />
      {drawn.map(({ series }) => (
        <History key={series.key} view={view} series={series} scale={scale} isCrowded={isCrowded} />
      ))}
      <LeftOutMarks view={view} scale={scale} />
      <g clipPath={`url(#${id}-plot)`}>
        {drawn.map(({ series }) => (
          <path
            key={series.key}
            d={linePath(view, series.key, 'mid', scale)}
            className={styles.median}
            stroke={markColour(series.tone)}
            strokeDasharray={series.isDashed ? DASH : undefined}
          />
        ))}
      </g>
      <LineEndNames series={view.series} layout={layout} scale={scale} lastMonth={view.monthDomain[1]} />
    </svg>
  );
}

interface SeriesProps {
  view: ForecastView;
  series: ForecastSeries;
  scale: PlotScale;
}

function Bands({ view, series, scale, hatch }: SeriesProps & { hatch: string }) {
  const colour = markColour(series.tone);
  const outer = bandPath(view, series.key, 'band90', scale);
  return (
    <>
      <path d={outer} fill={colour} fillOpacity="var(--band-outer)" />
      <path d={bandPath(view, series.key, 'band50', scale)} fill={colour} fillOpacity="var(--band-inner)" />
      {series.isHatched ? <path d={outer} fill={hatch} /> : null}
    </>
  );
}

function History({ view, series, scale, isCrowded }: SeriesProps & { isCrowded: boolean }) {
  const colour = markColour(series.tone);
  const places = series.marker === 'none' ? [] : readPlaces(view, series.key, 'seen', scale);
  return (
    <g>
      <path d={linePath(view, series.key, 'seen', scale)} className={styles.seen} stroke={colour} />
      {places.map(({ month, x, y }) =>
        series.marker === 'round' ? (
          <circle key={month} cx={x} cy={y} r={isCrowded ? 1.8 : 2.6} fill={colour} />
        ) : (
          <OpenSquare key={month} x={x} y={y} side={isCrowded ? 3.4 : 5.2} colour={colour} />
        ),
      )}
    </g>
  );
}

function OpenSquare({ x, y, side, colour }: { x: number; y: number; side: number; colour: string }) {
  return (
    <rect
      x={x - side / 2}
      y={y - side / 2}
      width={side}
      height={side}
      fill="var(--paper)"
      stroke={colour}
      strokeWidth={1.25}
    />
  );
}
