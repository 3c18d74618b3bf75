import { binaryOfFrame } from '../../core/protocol/binary-frame-writer.ts';
import { frameOf } from '../../core/record/frame-of.ts';
import type { Frame, InspectionPart, Origin, Part } from '../../core/record/part.ts';
import { Chance } from '../../server/demo/chance.ts';

/** What a test does to a server, one step after the other; the server's state follows from these alone. */
export type Step =
  | {
      readonly kind: 'frames';
      readonly source: string;
      /** Consecutive: each begins where the one before ends; a late fill stands alone. */
      readonly frames: readonly Frame[];
      readonly late: boolean;
    }
  | { readonly kind: 'acknowledge'; readonly note: string }
  | { readonly kind: 'restart'; readonly guarantee: string; readonly reason: string };

export const bytesOf = (frame: Frame): Uint8Array => binaryOfFrame(frame);

/** One frame that holds what two consecutive ones hold. */
export const joined = (one: Frame, next: Frame): Frame => frameOf(one.first, [...one.parts, ...next.parts]);

export const endOf = ({ first, records }: Frame): number => first + records;

export const begin = Date.UTC(2026, 5, 1, 10);

const hose = (station: string, characteristic: string, lot?: string): Origin => ({ station, product: 'BH-4', characteristic, lot });
const fill: Origin = { station: 'K.filling', product: 'FK-250', characteristic: 'fill', lot: undefined };

/** Makes the course of a plant: two sources, good and bad times, lots, changeovers, stops, corrections, a loss and its late fill. */
export class Course {
  readonly steps: Step[] = [];
  readonly #chance: Chance;
  readonly #next = new Map<string, number>();
  #at = begin;
  #lot = 0;

  constructor(seed: number) {
    this.#chance = new Chance('faults', seed);
  }

  /** Frames of the hose line; `ill` from 0 (well) to 1: the share of trouble. */
  hoses(count: number, ill: number): void {
    const frames: Frame[] = [];
    for (let i = 0; i < count; i += 1) frames.push(this.#frame('gateway-a', this.#hoseParts(ill)));
    this.#keep('gateway-a', frames);
  }

  bottles(count: number, ill: number): void {
    const frames: Frame[] = [];
    for (let i = 0; i < count; i += 1) {
      const value = Float64Array.from({ length: 20 }, () => 250.6 - ill + (this.#chance.share() + this.#chance.share() - 1));
      frames.push(this.#frame('gateway-k', [{ kind: 'measurements', origin: fill, records: 20, time: this.#steady(20, 1_500), value }]));
    }
    this.#keep('gateway-k', frames);
  }

  /** A loss of leak tests declared, more records, and the lost ones after all. */
  lossAndLateFill(records: number): void {
    const at = this.#at;
    const lost = this.#frame('gateway-a', [{ kind: 'lost', station: 'A.leak-test', records, at, reason: 'buffer overran' }]);
    this.#keep('gateway-a', [lost]);
    this.hoses(14, 0); // Long enough for a kill between the loss and its fill.
    const late = frameOf(lost.first, [{ ...this.#verdicts(hose('A.leak-test', 'tightness'), records, 0.05), time: { kind: 'steady', start: at, step: 20 } }]);
    this.steps.push({ kind: 'frames', source: 'gateway-a', frames: [late], late: true });
  }

  /** The line stops so long that it would be silent, runs again, changes its product and back, and a lot begins. */
  change(): void {
    const line = 'A';
    this.#lot += 1;
    const lot = `L-${this.#lot}`;
    const ended: Part[] = this.#lot > 1 ? [{ kind: 'lot-end', records: 1, at: this.#at, line, lot: `L-${this.#lot - 1}` }] : [];
    const parts: Part[] = [
      ...ended,
      { kind: 'line-stopped', records: 1, at: this.#later(1_000), line, reason: 'crimping tool changed' },
      { kind: 'line-running', records: 1, at: this.#later(600_000), line },
      { kind: 'changeover', records: 1, at: this.#later(1_000), line, product: this.#lot % 2 === 0 ? 'BH-5' : 'BH-4' },
      { kind: 'lot-start', records: 1, at: this.#later(1_000), line, product: 'BH-4', lot, size: 900 },
    ];
    this.#keep('gateway-a', [this.#frame('gateway-a', parts)]);
  }

  /** Nothing is sent for a while: the next record finds the line silent. */
  silence(spanMs: number): void {
    this.#at += spanMs;
  }

  /** A person acknowledges the oldest alarm that waits for it. */
  acknowledge(note: string): void {
    this.steps.push({ kind: 'acknowledge', note });
  }

  restart(guarantee: string, reason: string): void {
    this.steps.push({ kind: 'restart', guarantee, reason });
  }

  #hoseParts(ill: number): Part[] {
    const chance = this.#chance;
    const lot = this.#lot > 0 ? `L-${this.#lot}` : undefined;
    const force = Float64Array.from({ length: 15 }, () => 430 - 30 * ill + 20 * (chance.share() + chance.share() - 1));
    const metres = Float64Array.from({ length: 5 }, () => 1 + chance.share());
    const parts: Part[] = [
      { kind: 'exposures', origin: hose('A.cutting', 'surface'), records: 5, time: this.#steady(5, 300), exposure: metres, count: Uint32Array.from({ length: 5 }, () => (chance.share() < 0.01 + 0.1 * ill ? 1 : 0)) },
      { kind: 'measurements', origin: hose('A.crimping', 'pull-off-force'), records: 15, time: this.#steady(15, 150), value: force },
      this.#verdicts(hose('A.leak-test', 'tightness', lot), 30 + chance.below(60), 0.002 + 0.04 * ill),
      this.#tallies(hose('A.final', 'finish', lot), ill),
    ];
    if (lot !== undefined && chance.below(3) === 0) parts.push(this.#verdicts(hose('A.final', 'outgoing', lot), 10, 0.02 * ill));
    if (chance.below(5) === 0) parts.push(this.#correction());
    if (chance.below(40) === 0) parts.push(this.#verdicts(hose('A.paint', 'gloss'), 4, 0)); // No such station: set aside.
    return parts;
  }

  /** The newest records are corrected, an old one now and then: it may have left its window. */
  #correction(): Part {
    const next = this.#next.get('gateway-a') ?? 1;
    const corrects = Math.max(1, next - 1 - this.#chance.below(this.#chance.below(4) === 0 ? 6_000 : 200));
    return {
      kind: 'correction', records: 1, origin: hose('A.leak-test', 'tightness'), at: this.#later(50), corrects,
      finding: { kind: 'verdict', nonconforming: this.#chance.below(4) === 0 }, reason: 'tested again warm',
    };
  }

  #verdicts(origin: Origin, records: number, share: number): InspectionPart {
    const places = Array.from({ length: records }, (_, place) => place).filter(() => this.#chance.share() < share);
    return { kind: 'verdicts', origin, records, time: this.#steady(records, 40), nonconforming: Uint32Array.from(places) };
  }

  #tallies(origin: Origin, ill: number): InspectionPart {
    const inspected = Uint32Array.from({ length: 4 }, () => 5 + this.#chance.below(20));
    const nonconforming = inspected.map((units) => Math.min(units, this.#chance.share() < 0.1 + 0.5 * ill ? 1 + this.#chance.below(2) : 0));
    const start = this.#at;
    return { kind: 'tallies', origin, records: 4, time: { kind: 'each', times: Float64Array.from({ length: 4 }, (_, i) => start + i * 500) }, inspected, nonconforming };
  }

  #steady(records: number, step: number): { kind: 'steady'; start: number; step: number } {
    const start = this.#at;
    this.#at += records * step;
    return { kind: 'steady', start, step };
  }

  #later(spanMs: number): number {
    this.#at += spanMs;
    return this.#at;
  }

  #frame(source: string, parts: readonly Part[]): Frame {
    const frame = frameOf(this.#next.get(source) ?? 1, parts);
    this.#next.set(source, endOf(frame));
    return frame;
  }

  #keep(source: string, frames: readonly Frame[]): void {
    const last = this.steps.at(-1);
    if (last?.kind === 'frames' && last.source === source && !last.late) this.steps[this.steps.length - 1] = { ...last, frames: [...last.frames, ...frames] };
    else this.steps.push({ kind: 'frames', source, frames, late: false });
  }
}
