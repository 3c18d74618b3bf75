/**
 * How much of what was promised is used up: 0 at the target, 1 on the guarantee line, above 1 beyond it. Works for
 * 'at most' and 'at least' alike, because line and target stand in the same order as better and worse.
 *
 * @param value estimate or bound, in the line's unit; undefined gives undefined
 */
export function allowanceUsed(value: number | undefined, line: number, target: number): number | undefined {
  if (value === undefined) return undefined;
  const used = (value - target) / (line - target);
  return Number.isFinite(used) ? used : undefined;
}
