/** Whether a figure on run lengths can be shown as it stands. */
export type RunLengthStanding =
  | { readonly kind: 'holds' }
  /** Nonconforming units come in clusters: false calls are more frequent than the figure says. */
  | { readonly kind: 'clustered'; readonly remedies: readonly ClusterRemedy[] }
  /** The dispersion test gave no answer: the figure can neither be relied on nor refuted. */
  | { readonly kind: 'unknown' };

/**
 * What to do about clusters, in the order to try: count nonconforming units close together as one
 * event; raise the threshold by the dispersion; plan with a design effect; judge by lots.
 */
export type ClusterRemedy = 'merge' | 'temper' | 'design-effect' | 'lots';

const remedies: readonly ClusterRemedy[] = ['merge', 'temper', 'design-effect', 'lots'];

/**
 * Holds a run-length figure against the dispersion test of the same line: every run length on the
 * screen goes through here.
 *
 * @param pValue of the dispersion test, in [0, 1]; NaN where it gave no answer
 * @param warnBelow p-value below which clusters are taken as shown, above 0, below 1
 * @source dispersion warning level of 1 %: common practice, no source
 */
export function runLengthStanding(pValue: number, warnBelow = 0.01): RunLengthStanding {
  if (pValue < warnBelow) return { kind: 'clustered', remedies };
  return pValue >= warnBelow && pValue <= 1 ? { kind: 'holds' } : { kind: 'unknown' };
}
