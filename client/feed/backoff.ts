/**
 * How long to wait before the next try, ms: 0.5 s, doubling up to 15 s, spread by up to half so that many dashboards
 * do not come back in the same moment.
 *
 * @param failures  tries that failed in a row, 1 or more
 * @param chance    uniform in [0, 1)
 */
export function backoffMs(failures: number, chance: number): number {
  const full = Math.min(15_000, 500 * 2 ** Math.min(failures - 1, 10));
  return full * (0.5 + chance / 2);
}
