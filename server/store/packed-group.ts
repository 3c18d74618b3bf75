import type { Change } from '../../core/access/change.ts';
import type { Happening } from '../../core/monitor/happening.ts';
import type { Group, KeptHappening, Minute } from './group.ts';
import { packEntries, type PackedEntries } from './packed-entries.ts';

export interface HappeningRow {
  readonly journalId: number;
  readonly at: number;
  readonly guarantee: string | undefined;
  readonly kind: string;
  /** JSON. */
  readonly body: string;
}

export interface AlarmRow {
  readonly id: number;
  readonly guarantee: string;
  readonly ended: boolean;
  /** JSON. */
  readonly body: string;
}

/** A group whose happenings and alarms are text already, as they were when it was given. */
export interface WaitingGroup extends Pick<Group, 'entries' | 'minutes' | 'changes'> {
  readonly happenings: readonly HappeningRow[];
  readonly alarms: readonly AlarmRow[];
  /** About what it takes in memory and on disk. */
  readonly bytes: number;
}

/** Groups of one transaction, ready to change threads. */
export interface PackedGroup {
  readonly entries: PackedEntries;
  readonly happenings: readonly HappeningRow[];
  readonly alarms: readonly AlarmRow[];
  readonly minutes: readonly Minute[];
  readonly changes: readonly Change[];
}

/** Bytes of a row beside its body: figures, keys, the object itself. */
const rowBytes = 100;

export function waitingGroup({ entries, happenings, alarms, minutes, changes }: Group): WaitingGroup {
  const happeningRows = happenings.map(happeningRow);
  const alarmRows = alarms.map((alarm) => ({ id: alarm.id, guarantee: alarm.guarantee, ended: alarm.state.kind === 'ended', body: JSON.stringify(alarm) }));
  let bytes = (minutes.length + changes.length) * rowBytes;
  for (const entry of entries) bytes += rowBytes + entry.body.length;
  for (const row of happeningRows) bytes += rowBytes + row.body.length;
  for (const row of alarmRows) bytes += rowBytes + row.body.length;
  return { entries, minutes, changes, happenings: happeningRows, alarms: alarmRows, bytes };
}

export function packGroups(groups: readonly WaitingGroup[]): PackedGroup {
  return {
    entries: packEntries(groups.flatMap((group) => group.entries)),
    happenings: groups.flatMap((group) => group.happenings),
    alarms: groups.flatMap((group) => group.alarms),
    minutes: groups.flatMap((group) => group.minutes),
    changes: groups.flatMap((group) => group.changes),
  };
}

function happeningRow({ journalId, happening }: KeptHappening): HappeningRow {
  return { journalId, at: happening.at, guarantee: guaranteeOf(happening), kind: happening.kind, body: JSON.stringify(happening) };
}

/** The guarantee a happening belongs to; undefined for what concerns a line or a source. */
export function guaranteeOf(happening: Happening): string | undefined {
  switch (happening.kind) {
    case 'alarm':
      return happening.alarm.guarantee;
    case 'evidence':
    case 'restart':
    case 'run':
      return happening.guarantee;
    case 'line':
    case 'set-aside':
      return undefined;
  }
}
