import type { FieldPath } from './field-path.ts';
import type { Measure } from './figure-schemas.ts';

/** Reads measured values of one characteristic; complains where a unit is written that is not the characteristic's. */
export interface MeasureReader {
  readonly unit: string;
  read(measure: Measure, path: FieldPath): number | undefined;
}
