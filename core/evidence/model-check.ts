import { normalFit, type NormalFit } from '../bound/normality.ts';

/** Chance that a window of normal values is called unfit at one check. */
const level = 0.01;
/** Values looked at, the newest: enough to see a tail, few enough that rounding of the scale is not taken for one. */
const mostValues = 2000;
/** Values the check needs at least. */
const fewest = 8;

export interface ModelCheckSnapshot {
  readonly fit: NormalFit | undefined;
  readonly due: number;
}

interface Visited {
  visit(see: (value: number) => void, most: number): void;
}

/**
 * Whether the newest values of a window fit the normal model. Checked at fixed positions: with the 8th value, then each
 * time an eighth of the values looked at is new; and at once when values were put right, came late or left by the clock.
 */
export class ModelCheck {
  #fit: NormalFit | undefined;
  /** Values until the next check. */
  #due = fewest;

  get fit(): NormalFit | undefined {
    return this.#fit;
  }

  /** One more value was admitted. */
  seen(values: Visited): void {
    this.#due -= 1;
    if (this.#due <= 0) this.look(values);
  }

  look(values: Visited): void {
    const looked: number[] = [];
    values.visit((value) => looked.push(value), mostValues);
    this.#fit = normalFit(looked, level);
    this.#due = Math.max(looked.length < fewest ? 1 : fewest, looked.length >> 3);
  }

  clear(): void {
    this.#fit = undefined;
    this.#due = fewest;
  }

  snapshot(): ModelCheckSnapshot {
    return { fit: this.#fit, due: this.#due };
  }

  restore(from: ModelCheckSnapshot): void {
    this.#fit = from.fit;
    this.#due = from.due;
  }
}
