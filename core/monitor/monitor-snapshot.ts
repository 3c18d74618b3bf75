import type { AlarmDeskSnapshot } from '../alarm/alarm-desk.ts';
import type { Plant } from '../plant/plant.ts';
import { evidenceSettingsOf } from './evidence-settings.ts';
import { Monitor } from './monitor.ts';
import type { SourceListSnapshot } from './source-list.ts';
import type { StreamListSnapshot } from './stream-list.ts';
import type { WatchSnapshot } from './watch-snapshot.ts';

/** The form below; another one is refused, and the journal is replayed instead. */
export const snapshotForm = 2;

/** The whole state of a monitor as plain data (objects, arrays, typed arrays), without decisions not yet taken out. */
export interface MonitorSnapshot {
  readonly form: typeof snapshotForm;
  readonly plantVersion: string;
  readonly now: number;
  readonly sources: SourceListSnapshot;
  readonly streams: StreamListSnapshot;
  readonly desk: AlarmDeskSnapshot;
  readonly watches: readonly { readonly id: string; readonly settings: string; readonly watch: WatchSnapshot }[];
}

export function snapshotOf(monitor: Monitor): MonitorSnapshot {
  return {
    form: snapshotForm,
    plantVersion: monitor.plantVersion,
    now: monitor.now,
    sources: monitor.sources.snapshot(),
    streams: monitor.streams.snapshot(),
    desk: monitor.desk.snapshot(),
    watches: monitor.watches.map((watch) => ({ id: watch.guarantee.id, settings: evidenceSettingsOf(watch.guarantee), watch: watch.snapshot() })),
  };
}

/**
 * A monitor for a plant file that goes on from a snapshot. Guarantees whose evidence settings are the same carry
 * their evidence over; the others begin anew, and alarms that nothing stands behind any more return to normal.
 */
export function monitorFrom(plant: Plant, plantVersion: string, from: MonitorSnapshot): Monitor {
  const monitor = new Monitor(plant, plantVersion);
  monitor.sources.restore(from.sources);
  monitor.streams.restore(from.streams);
  monitor.desk.restore(from.desk);
  const kept = new Map(from.watches.map((entry) => [`${entry.id}\n${entry.settings}`, entry.watch]));
  const carried = new Set<string>();
  for (const watch of monitor.watches) {
    const { id } = watch.guarantee;
    const known = kept.get(`${id}\n${evidenceSettingsOf(watch.guarantee)}`);
    if (known === undefined) continue;
    watch.restore(known);
    carried.add(id);
  }
  monitor.resumeClock(from.now);
  for (const alarm of from.desk.standing) {
    if (!carried.has(alarm.guarantee) || (alarm.rule === 'deterioration' && !isDetected(monitor, alarm.guarantee))) {
      monitor.desk.returned(alarm.guarantee, alarm.rule, monitor.now);
    }
  }
  return monitor;
}

/** Whether the detector of a guarantee still stands behind its alarm. */
function isDetected({ watches }: Monitor, guarantee: string): boolean {
  return watches.some((watch) => watch.guarantee.id === guarantee && watch.change?.watch.alarmed === true);
}
