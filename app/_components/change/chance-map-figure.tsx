'use client';

/** Chance of keeping the share against size and start of the counter-push, as a shaded table that can be read cell by cell. */
import { buildChanceMapView } from '@/lib/brief/chance-map-view';
import type { ChanceMap } from '@/lib/scenario/answers';
import { FigureFrame } from '../figures/figure-frame';
import styles from './chance-map.module.css';
import { useScenario } from './scenario-state';

interface ChanceMapFigureProps {
  map: ChanceMap;
  /** "Quillfern’s share at 33 % or more in December 2027". */
  goal: string;
}

export function ChanceMapFigure({ map, goal }: ChanceMapFigureProps) {
  const { words } = useScenario();
  const view = buildChanceMapView(words, map);
  return (
    <FigureFrame caption={view.caption} table={view.table}>
      {/* biome-ignore lint/a11y/noNoninteractiveTabindex: a frame that scrolls must be reachable by keyboard */}
      <section className={styles.scroller} aria-label={`Chance of keeping ${goal}`} tabIndex={0}>
        <table className={styles.chances}>
          <caption className="visually-hidden">Chance of keeping {goal}, by size and start</caption>
          <thead>
            <tr>
              <th scope="col">{view.yLabel}</th>
              {view.columns.map((column) => (
                <th key={column.startMonth} scope="col">
                  {column.label}
                </th>
              ))}
            </tr>
          </thead>
          <tbody>
            {view.rows.map((row) => (
              <tr key={row.size}>
                <th scope="row">{row.label}</th>
                {row.cells.map((cell, index) => (
                  <td
                    key={view.columns[index]?.startMonth}
                    data-met={cell.meetsTarget || undefined}
                    style={{ '--chance': `${Math.round(100 * cell.chance)}%` } as React.CSSProperties}
                  >
                    {cell.text}
                  </td>
                ))}
              </tr>
            ))}
          </tbody>
        </table>
      </section>
    </FigureFrame>
  );
}
