'use client';

/** The phase map with the pushed path on it, and how many draws cross the tipping line. */
import dynamic from 'next/dynamic';
import { memo, useMemo } from 'react';
import { useElementSize } from '@/app/_lib/use-element-size';
import { placeMapLabels } from '@/lib/brief/map-labels';
import { buildPushPath } from '@/lib/brief/push-path';
import { sentence } from '@/lib/brief/text';
import type { PhaseMap } from '@/lib/brief/types';
import type { ScenarioComparison } from '@/lib/scenario/comparison';
import mapStyles from '../figures/map.module.css';
import { layOutMap } from '../figures/map-layout';
import { SentenceText } from '../text/sentence-text';
import styles from './change.module.css';
import { useScenario } from './scenario-state';

const PhasePlot = dynamic(() => import('../figures/plots').then((module) => module.PhasePlot), {
  ssr: false,
});

const LABEL_SIZE = 14;

interface PushPathMapProps {
  map: PhaseMap;
  comparison: ScenarioComparison;
}

/** Drawn anew only for another comparison, not for each move of a control. */
export const PushPathMap = memo(function PushPathMap({ map, comparison }: PushPathMapProps) {
  const { words } = useScenario();
  const [ref, size] = useElementSize<HTMLDivElement>();
  const path = useMemo(() => buildPushPath(words, map, comparison.pushes), [words, map, comparison]);
  const layout = useMemo(
    () =>
      size &&
      layOutMap(
        size,
        map.yTicks.map((tick) => tick.label),
      ),
    [size, map],
  );
  const labels = useMemo(
    () => (layout ? placeMapLabels(map, { ...layout.plot, fontSize: LABEL_SIZE }) : []),
    [map, layout],
  );
  return (
    <figure className={styles.pathFigure}>
      <h3 className={styles.figureName}>The pushed path on the map</h3>
      <div className={mapStyles.canvas} ref={ref}>
        <div
          className={mapStyles.picture}
          role="img"
          aria-label={`Phase map with the pushed path. ${path.text}`}
        >
          {size && layout ? (
            <PhasePlot
              map={map}
              labels={labels}
              layout={layout}
              size={size}
              pushed={path.points.map(({ point }) => point)}
            />
          ) : null}
        </div>
      </div>
      <figcaption className={styles.note}>
        <SentenceText
          sentence={sentence(
            `Thick dotted line: the path with the pushes. ${path.text}${wordCrossing(comparison)}`,
          )}
        />
      </figcaption>
    </figure>
  );
});

function wordCrossing({ crossing }: ScenarioComparison): string {
  if (!crossing || crossing.draws === 0) return '';
  return ` Of ${crossing.draws} draws in which the head start decides, ${crossing.crossed === 0 ? 'none crosses' : `${crossing.crossed} cross`} it.`;
}
