import { map, mergeMap, tap, type Observable, type OperatorFunction } from 'rxjs';
import type { Store } from '../store/store.ts';
import type { Arrival } from './arrival.ts';
import type { Judge, Outcome } from './judge.ts';

/** arrivals -> judged by the monitor -> durable -> answered */
export function throughPlant(arrivals$: Observable<readonly Arrival[]>, judge: Judge, store: Store): Observable<Outcome> {
  return arrivals$.pipe(intoOutcomes(judge), intoDurable(store), thenAnswered());
}

const intoOutcomes = (judge: Judge): OperatorFunction<readonly Arrival[], Outcome> => map((arrivals) => judge.judge(arrivals));

/**
 * Groups given while one is being written share the next transaction; the store resolves them in order. Their number
 * is bounded by the flow control of the sockets, which stop being read while much waits.
 */
const intoDurable = (store: Store): OperatorFunction<Outcome, Outcome> =>
  mergeMap(async (outcome) => {
    await store.commit(outcome.group);
    return outcome;
  });

const thenAnswered = (): OperatorFunction<Outcome, Outcome> =>
  tap(({ afterwards }) => {
    for (const answer of afterwards) answer();
  });
