import { mostTallied } from './checked-part.ts';
import type { Finding, InspectionPart, Origin } from './part.ts';
import type { TimeColumn } from './time-column.ts';

/** A part in the making: records of one origin and kind, added one by one. */
export class GrowingPart {
  readonly #origin: Origin;
  readonly #kind: Finding['kind'];
  readonly #times: number[] = [];
  /** Verdicts: places of the nonconforming. Tallies: inspected. Exposures: counts. Measurements: values. */
  readonly #main: number[] = [];
  /** Tallies: nonconforming. Exposures: exposure. */
  readonly #other: number[] = [];
  #tallied = 0;

  constructor(origin: Origin, kind: Finding['kind']) {
    this.#origin = origin;
    this.#kind = kind;
  }

  takes(origin: Origin, finding: Finding): boolean {
    const own = this.#origin;
    if (finding.kind === 'tally' && this.#tallied + finding.nonconforming > mostTallied) return false;
    return finding.kind === this.#kind && origin.station === own.station && origin.product === own.product
      && origin.characteristic === own.characteristic && origin.lot === own.lot;
  }

  add(at: number, finding: Finding): void {
    switch (finding.kind) {
      case 'verdict':
        if (finding.nonconforming) this.#main.push(this.#times.length);
        break;
      case 'tally':
        this.#main.push(finding.inspected);
        this.#other.push(finding.nonconforming);
        this.#tallied += finding.nonconforming;
        break;
      case 'exposure':
        this.#main.push(finding.count);
        this.#other.push(finding.exposure);
        break;
      case 'measurement':
        this.#main.push(finding.value);
    }
    this.#times.push(at);
  }

  part(): InspectionPart {
    const common = { origin: this.#origin, records: this.#times.length, time: columnOf(this.#times) };
    switch (this.#kind) {
      case 'verdict':
        return { kind: 'verdicts', ...common, nonconforming: Uint32Array.from(this.#main) };
      case 'tally':
        return { kind: 'tallies', ...common, inspected: Uint32Array.from(this.#main), nonconforming: Uint32Array.from(this.#other) };
      case 'exposure':
        return { kind: 'exposures', ...common, count: Uint32Array.from(this.#main), exposure: Float64Array.from(this.#other) };
      case 'measurement':
        return { kind: 'measurements', ...common, value: Float64Array.from(this.#main) };
    }
  }
}

/** An even pace is said in two numbers; whole milliseconds make it exact. */
function columnOf(times: readonly number[]): TimeColumn {
  const start = times[0] as number;
  const step = times.length > 1 ? (times[1] as number) - start : 0;
  return step >= 0 && times.every((time, i) => time === start + i * step)
    ? { kind: 'steady', start, step }
    : { kind: 'each', times: Float64Array.from(times) };
}
