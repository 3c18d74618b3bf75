import type { Alarm } from '../../core/alarm/alarm.ts';
import type { LiveChange, LiveSnapshot, PlantCard } from '../../core/live/message.ts';
import type { Happening } from '../../core/monitor/happening.ts';
import type { Monitor } from '../../core/monitor/monitor.ts';
import type { Watch } from '../../core/monitor/watch.ts';
import { cardOf } from '../../core/view/card-of.ts';
import { viewOf } from '../../core/view/view-of.ts';

interface Kept {
  revision: number;
  json: string;
  /** Id of its line; undefined where it belongs to none that is known. */
  line: string | undefined;
}

/** Views computed without letting others in: half a millisecond. */
const viewsAtOnce = 16;
/** Ended alarms kept for dashboards beside the standing ones. */
const mostEnded = 200;

/** Which lines a dashboard shows; those with the same key see the same. */
export interface Sight {
  readonly key: string;
  /** undefined: what belongs to no line. */
  sees(line: string | undefined): boolean;
}

export const seesAll: Sight = { key: '', sees: () => true };

/** What holds for a whole run of the server. */
export interface LiveSetting {
  readonly boot: string;
  readonly clockRate: number;
  readonly demo: boolean;
}

/**
 * The newest of everything dashboards show, each with the revision at which it changed: any dashboard catches up
 * with one message made from here, and a slow one costs no memory. What does not change is written only once.
 */
export class LiveBoard {
  readonly #setting: LiveSetting;
  readonly #views = new Map<string, Kept>();
  readonly #alarms = new Map<number, Kept & { ended: boolean }>();
  #plantJson = '';
  #cards: { readonly json: string; readonly line: string }[] = [];
  #lineOf = new Map<string, string>();
  #plantRevision = 0;
  #revision = 0;
  #shift: PlantCard['shift'];
  #shiftRevision = 0;
  #at = 0;
  readonly #changes = new Map<string, string>();

  constructor(setting: LiveSetting) {
    this.#setting = setting;
  }

  get revision(): number {
    return this.#revision;
  }

  get boot(): string {
    return this.#setting.boot;
  }

  get at(): number {
    return this.#at;
  }

  /** Begins with a plant file: everything is new. */
  begin(monitor: Monitor): void {
    const { plant, plantVersion } = monitor;
    this.#revision += 1;
    this.#plantRevision = this.#revision;
    this.#plantJson = JSON.stringify({
      name: plant.name,
      timeZone: plant.timeZone,
      version: plantVersion,
      lines: plant.lines.map(({ id, name }) => ({ id, name })),
    } satisfies Omit<PlantCard, 'shift'>);
    this.#lineOf = new Map(plant.guarantees.map(({ id, line }) => [id, line]));
    this.#cards = plant.guarantees.map((guarantee) => ({ json: JSON.stringify(cardOf(guarantee, plant)), line: guarantee.line }));
    this.#changes.clear();
    this.#views.clear();
    for (const watch of monitor.watches) watch.changed = true;
    for (const alarm of monitor.desk.standing()) this.#keepAlarm(alarm);
  }

  /** Alarms that ended before this start, oldest first. */
  remember(ended: readonly Alarm[]): void {
    for (const alarm of ended) this.#keepAlarm(alarm);
  }

  /**
   * Takes up durable happenings: an alarm change is never left out.
   *
   * @param at plant clock, ms
   * @returns whether there is an alarm change, to be sent at once
   */
  note(happenings: readonly Happening[], at: number): boolean {
    const before = this.#revision;
    for (const happening of happenings) if (happening.kind === 'alarm') this.#keepAlarm(happening.alarm);
    if (this.#revision === before) return false;
    this.#at = Math.max(this.#at, at);
    return true;
  }

  /**
   * Takes up what changed in the monitor since the last call, a few guarantees at a time: in between whoever runs it lets
   * records and alarms pass. It ends early where another plant file comes into force meanwhile.
   *
   * @param at plant clock, ms
   */
  *refreshing(monitor: Monitor, at: number): Generator<void, void, undefined> {
    this.#at = Math.max(this.#at, at);
    this.#changes.clear();
    const begun = this.#plantRevision;
    let taken = 0;
    for (const watch of monitor.watches) {
      if (!watch.changed) continue;
      this.#keepView(watch);
      taken += 1;
      if (taken % viewsAtOnce > 0) continue;
      yield;
      if (this.#plantRevision !== begun) return;
    }
    const shift = monitor.calendar.instanceAt(monitor.now);
    if (shift?.since === this.#shift?.since) return;
    this.#shift = shift;
    this.#shiftRevision = ++this.#revision;
    this.#changes.clear();
  }

  snapshot(sight: Sight = seesAll): string {
    const { boot, clockRate, demo } = this.#setting;
    const head = { type: 'snapshot', boot, revision: this.#revision, at: this.#at, clockRate, demo } satisfies Partial<LiveSnapshot>;
    const plant = `${this.#plantJson.slice(0, -1)}${this.#shift ? `,"shift":${JSON.stringify(this.#shift)}` : ''}}`;
    return `${JSON.stringify(head).slice(0, -1)},"plant":${plant},"cards":[${this.#cards.filter(({ line }) => sight.sees(line)).map(({ json }) => json).join(',')}],"views":[${jsonOf(this.#views, 0, sight)}],"alarms":[${jsonOf(this.#alarms, 0, sight)}]}`;
  }

  /** What a dashboard at `revision` lacks; a whole snapshot where the plant file changed since. */
  since(revision: number, sight: Sight = seesAll): string {
    if (revision < this.#plantRevision) return this.snapshot(sight);
    const key = `${revision} ${sight.key}`;
    const known = this.#changes.get(key);
    if (known !== undefined) return known;
    const head = { type: 'change', revision: this.#revision, at: this.#at } satisfies Partial<LiveChange>;
    const shift = this.#shiftRevision > revision ? `,"shift":${JSON.stringify(this.#shift ?? null)}` : '';
    const made = `${JSON.stringify(head).slice(0, -1)}${shift},"views":[${jsonOf(this.#views, revision, sight)}],"alarms":[${jsonOf(this.#alarms, revision, sight)}]}`;
    this.#changes.set(key, made);
    return made;
  }

  beat(): string {
    return JSON.stringify({ type: 'beat', revision: this.#revision, at: this.#at });
  }

  #keepView(watch: Watch): void {
    watch.changed = false;
    const json = JSON.stringify(viewOf(watch));
    const known = this.#views.get(watch.guarantee.id);
    if (known?.json === json) return;
    this.#changes.clear();
    this.#views.set(watch.guarantee.id, { revision: ++this.#revision, json, line: watch.guarantee.line });
  }

  #keepAlarm(alarm: Alarm): void {
    this.#alarms.delete(alarm.id);
    this.#alarms.set(alarm.id, { revision: ++this.#revision, json: JSON.stringify(alarm), ended: alarm.state.kind === 'ended', line: this.#lineOf.get(alarm.guarantee) });
    this.#changes.clear();
    let ended = 0;
    for (const kept of this.#alarms.values()) if (kept.ended) ended += 1;
    if (ended <= mostEnded) return;
    for (const [id, kept] of this.#alarms) {
      if (!kept.ended) continue;
      this.#alarms.delete(id);
      return;
    }
  }
}

function jsonOf(kept: ReadonlyMap<unknown, Kept>, since: number, sight: Sight): string {
  let text = '';
  for (const { revision, json, line } of kept.values()) if (revision > since && sight.sees(line)) text += text === '' ? json : `,${json}`;
  return text;
}
