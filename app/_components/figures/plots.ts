/** The plots of a brief as one piece to load: apart, each would bring its own copy of the chart library's marks. */
export { DifferencePlot } from '../change/difference-plot';
export { PushPlot } from '../change/push-plot';
export { OddsPlot } from './odds-plot';
export { PhasePlot } from './phase-plot';
