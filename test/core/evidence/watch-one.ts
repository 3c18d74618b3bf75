import { Monitor } from '../../../core/monitor/monitor.ts';
import type { Watch } from '../../../core/monitor/watch.ts';
import type { Part } from '../../../core/record/part.ts';
import { feed, monday, origins, plantOfText } from './evidence-plant.ts';

/** A monitor of one guarantee, fed part by part. */
export class WatchOne {
  readonly monitor: Monitor;
  readonly watch: Watch;
  #next = 1;
  #now = monday;

  /** @param guarantee its fields in one line, without id */
  constructor(guarantee: string) {
    this.monitor = new Monitor(plantOfText(`  - { id: one, ${guarantee} }`), 'v');
    this.watch = this.monitor.watches[0]!;
  }

  get state(): string {
    return this.watch.standing.state;
  }

  /** Takes parts; those of records one second apart, after all before. Returns how often alarms were raised, were raised again or returned. */
  take(...parts: Part[]): { raised: number; again: number; returned: number } {
    const told = { raised: 0, again: 0, returned: 0 };
    for (const part of parts) {
      const placed: Part = 'time' in part ? { ...part, time: { kind: 'steady', start: this.#now, step: 1000 } } : { ...part, at: this.#now };
      if ('time' in part) this.#now += part.records * 1000;
      const run = feed(this.monitor, [placed], 1, this.#next);
      this.#next = run.next;
      for (const happening of run.happenings) if (happening.kind === 'alarm' && happening.change in told) told[happening.change as 'raised'] += 1;
    }
    return told;
  }

  pause(ms: number): void {
    this.#now += ms;
  }
}

const time = { kind: 'steady', start: 0, step: 0 } as const;

export const good = (records: number, origin: keyof typeof origins = 'leak'): Part => ({ kind: 'verdicts', origin: origins[origin], records, time, nonconforming: new Uint32Array(0) });
export const bad = (records = 1, origin: keyof typeof origins = 'leak'): Part => ({ kind: 'verdicts', origin: origins[origin], records, time, nonconforming: Uint32Array.from({ length: records }, (_, place) => place) });
export const fills = (value: readonly number[]): Part => ({ kind: 'measurements', origin: origins.fill, records: value.length, time, value: Float64Array.from(value) });
export const cuts = (count: readonly number[], exposure: readonly number[]): Part => ({ kind: 'exposures', origin: origins.surface, records: count.length, time, count: Uint32Array.from(count), exposure: Float64Array.from(exposure) });
export const lotStart = (lot: string, size: number | undefined): Part => ({ kind: 'lot-start', records: 1, at: 0, line: 'A', product: 'BH-4', lot, size });
