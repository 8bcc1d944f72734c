'use client';

/** The phase map inside Recharts: the cloud of destinations as a scatter, everything else as layers over it. */
import { Scatter, ScatterChart, type ScatterShapeProps } from 'recharts';
import { markColour } from '@/app/_lib/tone';
import type { MapPoint, PhaseMap, PlacedLabel, Tone } from '@/lib/brief/types';
import { MapFrame, renderMapAxes } from './map-axes';
import type { MapLayout } from './map-layout';
import { PhaseLayers } from './phase-layers';

interface PhasePlotProps {
  map: PhaseMap;
  labels: PlacedLabel[];
  layout: MapLayout;
  size: { width: number; height: number };
  /** A path under pushes, drawn over the path ahead. */
  pushed?: MapPoint[];
}

export function PhasePlot({ map, labels, layout, size, pushed }: PhasePlotProps) {
  const cloud = map.cloud.map(({ point, tone }) => ({ x: point[0], y: point[1], tone }));
  return (
    <ScatterChart width={size.width} height={size.height} margin={layout.margin} accessibilityLayer={false}>
      {renderMapAxes(
        { domain: map.domain.x, ticks: map.xTicks },
        { domain: map.domain.y, ticks: map.yTicks },
        layout,
        'linear',
      )}
      <MapFrame xLabel={map.xLabel} yLabel={map.yLabel} />
      <Scatter data={cloud} shape={renderCloudPoint} isAnimationActive={false} />
      <PhaseLayers map={map} labels={labels} pushed={pushed} />
    </ScatterChart>
  );
}

export function renderCloudPoint({ cx, cy, ...rest }: ScatterShapeProps) {
  const { tone } = rest as unknown as { tone: Tone };
  return <circle cx={cx} cy={cy} r={1.9} fill={markColour(tone)} fillOpacity={0.45} />;
}
