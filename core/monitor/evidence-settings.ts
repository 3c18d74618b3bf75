import type { Guarantee } from '../plant/guarantee.ts';

/** The settings of a guarantee that its evidence depends on, as one text: where they are the same, evidence is carried over. A detector carries over by its own. */
export function evidenceSettingsOf(guarantee: Guarantee): string {
  const { stations, product, characteristics, promise, tail, window, looks, normalRate, safetyRelevant, stationError, clusters, rules } = guarantee;
  const settings = rules.filter(({ kind }) => kind !== 'deterioration').map((rule) => ({ ...rule, priority: undefined, response: undefined }));
  const remedies = stationError === undefined && clusters === undefined ? [] : [{ stationError, clusters }];
  return JSON.stringify([stations, product ?? null, characteristics, promise, tail, window, looks, normalRate ?? null, safetyRelevant, settings, ...remedies]);
}
