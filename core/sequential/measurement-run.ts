/**
 * What a run of evidence on a mean remembers of its measurements. Plain data. Values are admitted one
 * by one in their order, so cutting the stream into other batches changes no bit.
 */
export interface MeasurementRun {
  readonly measurements: number;
  /** average of (measurement - line) */
  readonly excess: number;
  /** sum of squared deviations from the average */
  readonly squares: number;
  /** sum of cubed deviations from the average */
  readonly cubes: number;
}

/** A run without a measurement yet. */
export const newMeasurementRun: MeasurementRun = { measurements: 0, excess: 0, squares: 0, cubes: 0 };

/**
 * The run with one measurement more.
 *
 * @param measurement finite, in the unit of the line
 * @param line the guaranteed mean; the same through the run, it keeps the sums small
 * @source B. P. Welford 1962, T. B. Terriberry 2007 for the cubes (memory)
 */
export function admitMeasurement(run: MeasurementRun, measurement: number, line: number): MeasurementRun {
  const n = run.measurements + 1;
  const off = measurement - line - run.excess;
  const step = off / n;
  const grown = off * step * (n - 1);
  return {
    measurements: n,
    excess: run.excess + step,
    squares: run.squares + grown,
    cubes: run.cubes + grown * step * (n - 2) - 3 * step * run.squares,
  };
}

/** Sample skewness: third moment about the average over the cube of the standard deviation; NaN without spread. */
export function skewnessOf({ measurements, squares, cubes }: MeasurementRun): number {
  return (Math.sqrt(measurements) * cubes) / (squares * Math.sqrt(squares));
}
