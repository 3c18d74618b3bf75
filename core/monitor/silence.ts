import type { AlarmGrounds } from '../alarm/alarm.ts';
import type { Moment } from '../evidence/moment.ts';
import type { Standing } from '../evidence/standing.ts';
import type { AlarmRule, Guarantee } from '../plant/guarantee.ts';
import { silentFrom } from './silence-watch.ts';
import type { WatchSurroundings } from './watch-surroundings.ts';

export type SilenceRule = Extract<AlarmRule, { kind: 'silence' }>;

/** What a silence acts on. */
export interface Silenced {
  readonly guarantee: Guarantee;
  readonly around: Pick<WatchSurroundings, 'streams' | 'line' | 'now' | 'desk'>;
  readonly standing: Standing;
  readonly evidence: { weigh(moment: Moment): void };
}

type Grounds = (moment: Moment, figures: Readonly<Record<string, number>>) => AlarmGrounds;

/** undefined where the plant file switches the rule off. */
export function silenceOf(silenced: Silenced, grounds: Grounds): Silence | undefined {
  const rule = silenced.guarantee.rules.find((one): one is SilenceRule => one.kind === 'silence');
  return rule && new Silence(rule, silenced, grounds);
}

/** The silence rule of one guarantee: makes its evidence unknown while its stations are silent (rule S1). */
export class Silence {
  readonly #rule: SilenceRule;
  readonly #of: Silenced;
  readonly #grounds: Grounds;

  constructor(rule: SilenceRule, silenced: Silenced, grounds: Grounds) {
    this.#rule = rule;
    this.#of = silenced;
    this.#grounds = grounds;
  }

  /** When it falls silent if nothing comes, ms; Infinity while it is silent, or cannot be. */
  get due(): number {
    return this.#isSilent() ? Infinity : this.#from();
  }

  /** The clock has come to a moment. */
  fall(moment: Moment): void {
    if (this.due > moment.at) return;
    this.#of.standing.block('silence', 'No record comes although the line is said to run.');
    this.#of.evidence.weigh(moment);
    this.#of.around.desk.raise(this.#of.guarantee, this.#rule, moment.at, () => this.#grounds(moment, { silentMs: this.#rule.afterMs }));
  }

  /**
   * Lifts the silence once none of its stations is silent; that is when it was heard, whenever the record was inspected.
   *
   * @returns whether it was lifted
   */
  hear(moment: Moment): boolean {
    if (!this.#isSilent()) return false;
    const now = this.#of.around.now();
    if (this.#from() <= now) return false;
    const heard: Moment = { source: moment.source, sequence: moment.sequence, at: moment.at > now ? moment.at : now };
    this.#of.standing.lift('silence');
    this.#of.evidence.weigh(heard);
    this.#of.around.desk.returned(this.#of.guarantee.id, 'silence', heard.at);
    return true;
  }

  #isSilent(): boolean {
    return this.#of.standing.isBlockedBy('silence');
  }

  #from(): number {
    const { streams, line } = this.#of.around;
    return silentFrom(streams, line, this.#of.guarantee.product, this.#rule.afterMs);
  }
}
