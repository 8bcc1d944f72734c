'use client';

/** Up to four scenarios in one figure and one table, beside no push: the middle of each, told apart by dash and mark. */
import { useMemo, useState } from 'react';
import { LOCALE } from '@/app/_lib/locale';
import { useElementSize } from '@/app/_lib/use-element-size';
import type { BriefFacts } from '@/lib/brief/facts';
import { buildSideBySide, type NamedComparison, type SideBySide } from '@/lib/brief/side-by-side';
import type { ForecastSeriesKey } from '@/lib/brief/types';
import { ViewSwitch } from '../controls/view-switch';
import { FigureFrame } from '../figures/figure-frame';
import { NumbersGrid } from '../figures/numbers-table';
import styles from './change.module.css';
import { LINE_STYLES, SideBySidePlot } from './side-by-side-plot';

interface SideBySideFigureProps {
  scenarios: readonly NamedComparison[];
  facts: BriefFacts;
}

export function SideBySideFigure({ scenarios, facts }: SideBySideFigureProps) {
  const view = useMemo(() => buildSideBySide(scenarios, facts, LOCALE), [scenarios, facts]);
  return <SideBySideView view={view} names={facts.market} />;
}

interface SideBySideViewProps {
  view: SideBySide;
  names: Pick<BriefFacts['market'], 'focalName' | 'rivalName'>;
}

export function SideBySideView({ view, names }: SideBySideViewProps) {
  const [key, setKey] = useState<ForecastSeriesKey>('share');
  const [ref, size] = useElementSize<HTMLDivElement>();
  const views = [
    { id: 'share', label: `Share of ${names.focalName}` },
    { id: 'focal', label: names.focalName },
    { id: 'rival', label: names.rivalName },
  ] as const;
  return (
    <FigureFrame caption={view.caption} table={null}>
      <h3 className={styles.figureName}>Side by side</h3>
      <ViewSwitch label="What the chart counts" views={views} value={key} onChange={setKey} />
      <p className={styles.names}>
        {view.series.map((name, index) => (
          <span key={name}>
            <svg width={30} height={10} aria-hidden="true">
              <line x1={0} x2={30} y1={5} y2={5} {...LINE_STYLES[index]} />
            </svg>{' '}
            {name}
          </span>
        ))}
      </p>
      <div className={styles.canvas} ref={ref}>
        <div
          className={styles.picture}
          role="img"
          aria-label={`${view.series.join(', ')}: the middle of each, by month`}
        >
          {size ? <SideBySidePlot rows={view.figures[key]} isShare={key === 'share'} size={size} /> : null}
        </div>
      </div>
      <NumbersGrid table={view.table} isWhole />
    </FigureFrame>
  );
}
