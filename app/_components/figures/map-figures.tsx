'use client';

/** The phase map and the odds map with their frames. The plots load after the page; their places are reserved. */
import dynamic from 'next/dynamic';
import type { ReactNode } from 'react';
import { useElementSize } from '@/app/_lib/use-element-size';
import { useIsWanted } from '@/app/_lib/use-is-wanted';
import { placeMapLabels } from '@/lib/brief/map-labels';
import type { OddsMap, PhaseMap, Tick } from '@/lib/brief/types';
import { FigureFrame } from './figure-frame';
import styles from './map.module.css';
import { layOutMap, type MapLayout } from './map-layout';

const PhasePlot = dynamic(() => import('./plots').then((module) => module.PhasePlot), { ssr: false });
const OddsPlot = dynamic(() => import('./plots').then((module) => module.OddsPlot), { ssr: false });

const LABEL_SIZE = 14;

export function PhaseMapFigure({ map }: { map: PhaseMap }) {
  return (
    <FigureFrame caption={map.caption} table={map.table}>
      <MapCanvas title={map.title} yTicks={map.yTicks}>
        {(size, layout) => (
          <PhasePlot
            map={map}
            labels={placeMapLabels(map, { ...layout.plot, fontSize: LABEL_SIZE })}
            layout={layout}
            size={size}
          />
        )}
      </MapCanvas>
    </FigureFrame>
  );
}

export function OddsMapFigure({ map }: { map: OddsMap }) {
  return (
    <FigureFrame caption={map.caption} table={map.table}>
      <MapCanvas title={map.title} yTicks={map.yTicks}>
        {(size, layout) => <OddsPlot map={map} layout={layout} size={size} />}
      </MapCanvas>
    </FigureFrame>
  );
}

interface MapCanvasProps {
  title: string;
  yTicks: Tick[];
  children: (size: { width: number; height: number }, layout: MapLayout) => ReactNode;
}

function MapCanvas({ title, yTicks, children }: MapCanvasProps) {
  const [ref, size] = useElementSize<HTMLDivElement>();
  const isWanted = useIsWanted(ref);
  return (
    <div className={styles.canvas} ref={ref}>
      <div className={styles.picture} role="img" aria-label={title}>
        {size && isWanted
          ? children(
              size,
              layOutMap(
                size,
                yTicks.map((tick) => tick.label),
              ),
            )
          : null}
      </div>
    </div>
  );
}
