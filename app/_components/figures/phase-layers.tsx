'use client';

/** The layers of the phase map over its axes. Points are [focal users, rival users]; Recharts' scales place them. */
import { usePlotArea, useXAxisScale, useYAxisScale, ZIndexLayer } from 'recharts';

import { markColour, textColour } from '@/app/_lib/tone';
import type { MapDirection, MapEquilibrium, MapPoint, PhaseMap, PlacedLabel } from '@/lib/brief/types';
import styles from './map.module.css';
import { ABOVE_MARKS } from './map-layout';

interface Frame {
  x: number;
  y: number;
  width: number;
  height: number;
}

type Place = (point: MapPoint) => { x: number; y: number };

const ARROW_LENGTH = 13;
const ARROW_HEAD = 4;
/** Turn of the arrow head's strokes from its shaft, radians. */
const HEAD_TURN = 0.5;
const FAINTEST_ARROW = 0.12;
const EQUILIBRIUM_RADIUS = 5.5;

interface PhaseLayersProps {
  map: PhaseMap;
  labels: PlacedLabel[];
  pushed?: MapPoint[] | undefined;
}

export function PhaseLayers({ map, labels, pushed }: PhaseLayersProps) {
  const frame = usePlotArea();
  const scaleX = useXAxisScale();
  const scaleY = useYAxisScale();
  if (!frame || !scaleX || !scaleY) return null;
  const place: Place = ([focal, rival]) => ({ x: scaleX(focal) ?? 0, y: scaleY(rival) ?? 0 });
  return (
    <ZIndexLayer zIndex={ABOVE_MARKS}>
      {map.directions.map((direction) => renderDirection(direction, place))}
      {map.growthStops.map((stop) => (
        <polyline
          key={stop.firm}
          points={listPoints(stop.points, place)}
          fill="none"
          stroke={markColour(stop.tone)}
          strokeWidth={2}
          strokeDasharray={stop.isDashed ? '7 4' : undefined}
        />
      ))}
      {map.separatrix ? (
        <polyline points={listPoints(map.separatrix, place)} className={styles.separatrix} />
      ) : null}
      <Paths map={map} place={place} />
      {pushed ? <polyline points={listPoints(pushed, place)} className={styles.pushed} /> : null}
      {map.equilibria.map((equilibrium) => renderEquilibrium(equilibrium, place))}
      {labels.map((label) => renderLabel(label, frame))}
    </ZIndexLayer>
  );
}

function listPoints(points: MapPoint[], place: Place): string {
  return points
    .map((point) => place(point))
    .map(({ x, y }) => `${x.toFixed(1)},${y.toFixed(1)}`)
    .join(' ');
}

function renderDirection({ at, dx, dy, strength }: MapDirection, place: Place) {
  if (strength < FAINTEST_ARROW) return null;
  const { x, y } = place(at);
  const angle = Math.atan2(-dy, dx);
  const tipX = x + (Math.cos(angle) * ARROW_LENGTH) / 2;
  const tipY = y + (Math.sin(angle) * ARROW_LENGTH) / 2;
  const head = (turn: number) =>
    `M${tipX},${tipY}L${tipX - Math.cos(angle + turn) * ARROW_HEAD},${tipY - Math.sin(angle + turn) * ARROW_HEAD}`;
  const shaft = `M${tipX - Math.cos(angle) * ARROW_LENGTH},${tipY - Math.sin(angle) * ARROW_LENGTH}L${tipX},${tipY}`;
  return (
    <path
      key={`${at[0]}/${at[1]}`}
      d={`${shaft}${head(HEAD_TURN)}${head(-HEAD_TURN)}`}
      className={styles.direction}
      strokeOpacity={0.25 + 0.45 * strength}
    />
  );
}

function Paths({ map, place }: { map: PhaseMap; place: Place }) {
  const marked = map.pathSoFar.flat().filter((point) => point.mark !== null);
  return (
    <g>
      <polyline
        points={listPoints(
          map.pathAhead.map((step) => step.point),
          place,
        )}
        className={styles.ahead}
      />
      {map.pathSoFar.map((piece) => (
        <polyline
          key={piece[0]?.month}
          points={listPoints(
            piece.map((step) => step.point),
            place,
          )}
          className={styles.past}
        />
      ))}
      {marked.map(({ point, month }) => {
        const { x, y } = place(point);
        return (
          <circle key={month} cx={x} cy={y} r={2.6} fill="var(--ink)" stroke="var(--paper)" strokeWidth={1} />
        );
      })}
    </g>
  );
}

function renderEquilibrium({ point, marker, tone, name }: MapEquilibrium, place: Place) {
  const { x, y } = place(point);
  const colour = markColour(tone);
  const r = EQUILIBRIUM_RADIUS;
  return (
    <g key={name}>
      <circle
        cx={x}
        cy={y}
        r={r}
        fill={marker === 'filled' ? colour : 'var(--paper)'}
        stroke={colour}
        strokeWidth={2}
      />
      {marker === 'half' ? <path d={`M${x},${y - r}a${r},${r} 0 0 1 0,${2 * r}z`} fill={colour} /> : null}
    </g>
  );
}

function renderLabel({ id, text, tone, isStrong, x, y, anchor }: PlacedLabel, frame: Frame) {
  return (
    <text
      key={id}
      x={frame.x + x * frame.width}
      y={frame.y + (1 - y) * frame.height}
      textAnchor={anchor}
      fill={textColour(tone)}
      className={isStrong ? styles.strongLabel : styles.label}
    >
      {text}
    </text>
  );
}
