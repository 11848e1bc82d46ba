import type { DrawnGauge } from './drawn-gauges';

/** A gauge as the sheet shows it. */
export interface GaugeView extends DrawnGauge {
  /** Read out. */
  readonly name: string;
}

export function gaugeView(drawn: DrawnGauge, name: string): GaugeView {
  return { ...drawn, name };
}
