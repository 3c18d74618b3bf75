import type { LineMark } from '../record/part.ts';
import type { EpochMs } from '../units.ts';
import { BadDataLog, type BadDataSnapshot } from './bad-data-log.ts';
import type { Happening } from './happening.ts';
import type { Streams } from './routes.ts';
import type { LineCondition, StreamActivity } from './silence-watch.ts';

export interface StreamListSnapshot {
  readonly activities: readonly (readonly [key: string, StreamActivity])[];
  readonly badData: readonly (readonly [station: string, BadDataSnapshot])[];
  readonly lines: readonly (readonly [line: string, LineCondition])[];
}

/** What a monitor knows of its lines, stations and streams beside the evidence. Objects stay the same ones: watches hold them. */
export class StreamList implements Streams {
  readonly #activities = new Map<string, StreamActivity>();
  readonly #badData = new Map<string, BadDataLog>();
  readonly #lines = new Map<string, LineCondition>();
  readonly #declared: ReadonlySet<string>;

  constructor(lines: readonly string[]) {
    this.#declared = new Set(lines);
  }

  activity(station: string, characteristic: string): StreamActivity {
    return known(this.#activities, `${station}\n${characteristic}`, () => ({ at: 0, product: '' }));
  }

  badData(station: string): BadDataLog {
    return known(this.#badData, station, () => new BadDataLog());
  }

  line(line: string): LineCondition {
    return known(this.#lines, line, () => ({ running: undefined, since: 0, product: undefined, lot: undefined, lotSize: undefined }));
  }

  /** A line of the plant file; undefined for any other. */
  knownLine(line: string): LineCondition | undefined {
    return this.#declared.has(line) ? this.line(line) : undefined;
  }

  /** Takes what a line says of itself. `at`: the plant clock. */
  mark(line: LineCondition, mark: LineMark, at: EpochMs): Happening {
    switch (mark.kind) {
      case 'changeover':
        line.product = mark.product;
        return { kind: 'line', at, line: mark.line, mark: mark.kind, detail: mark.product };
      case 'lot-start':
        line.product = mark.product;
        line.lot = mark.lot;
        line.lotSize = mark.size;
        return { kind: 'line', at, line: mark.line, mark: mark.kind, detail: mark.lot };
      case 'lot-end':
        if (line.lot === mark.lot) {
          line.lot = undefined;
          line.lotSize = undefined;
        }
        return { kind: 'line', at, line: mark.line, mark: mark.kind, detail: mark.lot };
      case 'line-stopped':
        line.running = false;
        line.since = at;
        return { kind: 'line', at, line: mark.line, mark: mark.kind, detail: mark.reason };
      case 'line-running':
        line.running = true;
        line.since = at;
        return { kind: 'line', at, line: mark.line, mark: mark.kind, detail: '' };
    }
  }

  snapshot(): StreamListSnapshot {
    return {
      activities: [...this.#activities].map(([key, activity]) => [key, { ...activity }]),
      badData: [...this.#badData].map(([station, log]) => [station, log.snapshot()]),
      lines: [...this.#lines].map(([line, condition]) => [line, { ...condition }]),
    };
  }

  restore(from: StreamListSnapshot): void {
    for (const [key, activity] of from.activities) {
      const cut = key.indexOf('\n');
      Object.assign(this.activity(key.slice(0, cut), key.slice(cut + 1)), activity);
    }
    for (const [station, log] of from.badData) this.badData(station).restore(log);
    for (const [line, condition] of from.lines) Object.assign(this.line(line), condition);
  }
}

function known<V>(map: Map<string, V>, key: string, make: () => V): V {
  let value = map.get(key);
  if (value === undefined) {
    value = make();
    map.set(key, value);
  }
  return value;
}
