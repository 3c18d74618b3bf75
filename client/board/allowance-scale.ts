/** Ticks a reader finds on the scale; 1 is the guarantee line. */
export const ticks = [0, 0.25, 0.5, 0.75, 1, 2, 4] as const;

/** Allowance at the right end; what is beyond is drawn there with a mark that it goes on. */
export const farEnd = 8;

/** Where an allowance stands in a drawing of `width` px. */
export interface Place {
  readonly x: number;
  /** The value lies beyond the drawing's end: the mark says so, the place does not pretend. */
  readonly beyond: boolean;
}

/** Places of the scale in px: `targetX` is 0 %, `lineX` is 100 %. */
export interface AllowanceScale {
  readonly width: number;
  readonly targetX: number;
  readonly lineX: number;
  readonly placeOf: (allowance: number) => Place;
}

/**
 * From 0 % to 100 % linear, so that half the way is half the allowance; beyond the line by logarithm up to 800 %; below
 * the target drawn together into the margin, which no value leaves.
 *
 * @param width  px, above 0
 */
export function allowanceScale(width: number): AllowanceScale {
  const edge = Math.min(16, width * 0.03);
  const targetX = Math.round(width * 0.08);
  const lineX = Math.round(width * 0.68);
  const endX = width - edge;
  const placeOf = (allowance: number): Place => {
    if (allowance < 0) return { x: edge + (targetX - edge) / (1 - allowance), beyond: false };
    if (allowance <= 1) return { x: targetX + (lineX - targetX) * allowance, beyond: false };
    if (allowance >= farEnd) return { x: endX, beyond: allowance > farEnd };
    return { x: lineX + ((endX - lineX) * Math.log(allowance)) / Math.log(farEnd), beyond: false };
  };
  return { width, targetX, lineX, placeOf };
}
