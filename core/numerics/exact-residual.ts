const splitter = 134_217_729;

/**
 * count - total * share, rounded once: the product's rounding error is carried along.
 * Without it the distance of a count of 1e8 from its expectation has only half its digits.
 *
 * @source T. J. Dekker 1971, product in two doubles (memory); own use
 */
export function excessOf(count: number, total: number, share: number): number {
  const product = total * share;
  const totalSplit = splitter * total;
  const totalHigh = totalSplit - (totalSplit - total);
  const totalLow = total - totalHigh;
  const shareSplit = splitter * share;
  const shareHigh = shareSplit - (shareSplit - share);
  const shareLow = share - shareHigh;
  const error = totalLow * shareLow - (product - totalHigh * shareHigh - totalLow * shareHigh - totalHigh * shareLow);
  return count - product - error;
}
