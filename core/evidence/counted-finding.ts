import type { Finding } from '../record/part.ts';
import { beyondLimit, type Limit } from './nonconforming-places.ts';

/** A finding in units; `inspected` is undefined where a record is one unit. */
export interface CountedFinding {
  readonly nonconforming: number;
  readonly inspected: number | undefined;
}

/** What a finding says in units; undefined where it is of another kind than is counted here. */
export function countedFinding(finding: Finding, limit: Limit | undefined): CountedFinding | undefined {
  switch (finding.kind) {
    case 'verdict':
      return { nonconforming: finding.nonconforming ? 1 : 0, inspected: undefined };
    case 'tally':
      return { nonconforming: finding.nonconforming, inspected: finding.inspected };
    case 'measurement':
      return limit && { nonconforming: beyondLimit(finding.value, limit) ? 1 : 0, inspected: undefined };
    case 'exposure':
      return undefined;
  }
}
