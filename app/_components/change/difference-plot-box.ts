/** Where the plot of the difference chart lies inside its frame, CSS pixels; the chart and its month reader share it. */
import type { PlotBox } from '../figures/forecast-layout';

export const DIFFERENCE_MARGIN = { top: 8, right: 12, bottom: 0, left: 0 };
export const DIFFERENCE_AXES = { x: 30, y: 74 };

export function placeDifferencePlot(size: { width: number; height: number }): PlotBox {
  return {
    x: DIFFERENCE_AXES.y,
    y: DIFFERENCE_MARGIN.top,
    width: Math.max(1, size.width - DIFFERENCE_AXES.y - DIFFERENCE_MARGIN.right),
    height: Math.max(1, size.height - DIFFERENCE_MARGIN.top - DIFFERENCE_AXES.x),
  };
}
