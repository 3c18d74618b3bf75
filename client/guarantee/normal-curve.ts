/**
 * Points of a normal density for drawing, `steps` + 1 of them, from left to right.
 *
 * @source own drawing; the density is the textbook one
 */
export function normalCurve(mean: number, sd: number, from: number, to: number, steps: number): readonly (readonly [number, number])[] {
  if (!(sd > 0) || !(to > from)) return [];
  return Array.from({ length: steps + 1 }, (_, index) => {
    const x = from + ((to - from) * index) / steps;
    const z = (x - mean) / sd;
    return [x, Math.exp(-0.5 * z * z) / (sd * Math.sqrt(2 * Math.PI))] as const;
  });
}
