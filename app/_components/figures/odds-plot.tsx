'use client';

/** The odds map inside Recharts: alpha against beta on log axes, one dot for each draw shown. */
import { Scatter, ScatterChart } from 'recharts';
import type { OddsMap } from '@/lib/brief/types';
import { thinLogTicks } from './forecast-layout';
import { MapFrame, renderMapAxes } from './map-axes';
import type { MapLayout } from './map-layout';
import { OddsLines, OddsQuarters } from './odds-layers';
import { renderCloudPoint } from './phase-plot';

interface OddsPlotProps {
  map: OddsMap;
  layout: MapLayout;
  size: { width: number; height: number };
}

export function OddsPlot({ map, layout, size }: OddsPlotProps) {
  const cloud = map.points.map(({ alpha, beta, tone }) => ({ x: alpha, y: beta, tone }));
  return (
    <ScatterChart width={size.width} height={size.height} margin={layout.margin} accessibilityLayer={false}>
      {renderMapAxes(
        { domain: map.domain.x, ticks: thinLogTicks(map.xTicks, map.domain.x, layout.plot.width) },
        { domain: map.domain.y, ticks: map.yTicks },
        layout,
        'log',
      )}
      <OddsQuarters map={map} />
      <MapFrame xLabel={map.xLabel} yLabel={map.yLabel} />
      <Scatter data={cloud} shape={renderCloudPoint} isAnimationActive={false} />
      <OddsLines map={map} />
    </ScatterChart>
  );
}
