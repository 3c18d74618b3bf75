import { Counter, Gauge, Histogram, Registry, collectDefaultMetrics, type OpenMetricsContentType } from 'prom-client';

/** What operators can measure, as OpenMetrics text. */
export interface Measures {
  readonly registry: Registry<OpenMetricsContentType>;
  readonly frames: Counter;
  readonly records: Counter;
  readonly refusedFrames: Counter;
  readonly commits: Counter;
  readonly commitSeconds: Histogram;
}

/** What is read at the moment of asking. */
export interface Readings {
  readonly waitingBytes: () => number;
  readonly sources: () => number;
  readonly dashboards: () => number;
  readonly standingAlarms: () => number;
  readonly guaranteesByState: () => Readonly<Record<string, number>>;
}

export function measuresOf(readings: Readings): Measures {
  const registry = new Registry<OpenMetricsContentType>();
  registry.setContentType(Registry.OPENMETRICS_CONTENT_TYPE);
  collectDefaultMetrics({ register: registry });
  const registers = [registry];
  const gauge = (name: string, help: string, read: () => number): Gauge =>
    new Gauge({
      name,
      help,
      registers,
      collect() {
        this.set(read());
      },
    });
  gauge('vouchline_waiting_bytes', 'Bytes accepted and not yet durable.', readings.waitingBytes);
  gauge('vouchline_sources_connected', 'Sources connected now.', readings.sources);
  gauge('vouchline_dashboards_connected', 'Dashboards connected now.', readings.dashboards);
  gauge('vouchline_alarms_standing', 'Alarms that have not ended.', readings.standingAlarms);
  new Gauge({
    name: 'vouchline_guarantees',
    help: 'Guarantees by evidence state.',
    labelNames: ['state'],
    registers,
    collect() {
      for (const [state, guarantees] of Object.entries(readings.guaranteesByState())) this.set({ state }, guarantees);
    },
  });
  return {
    registry,
    frames: new Counter({ name: 'vouchline_frames', help: 'Frames read.', registers }),
    records: new Counter({ name: 'vouchline_records', help: 'Records in frames read, repeats included.', registers }),
    refusedFrames: new Counter({ name: 'vouchline_refused_frames', help: 'Frames refused.', registers }),
    commits: new Counter({ name: 'vouchline_commits', help: 'Groups made durable.', registers }),
    commitSeconds: new Histogram({
      name: 'vouchline_commit_seconds',
      help: 'Time from a judged batch to its being durable.',
      buckets: [0.0005, 0.001, 0.002, 0.005, 0.01, 0.02, 0.05, 0.1, 0.2, 0.5, 1, 2],
      registers,
    }),
  };
}
