import * as v from 'valibot';
import type { Source, SourceRegister } from '../store/source-register.ts';
import { StoreError } from '../store/store-error.ts';
import { actingName } from './acting-name.ts';
import { sourceAnswer, sourcesAnswer, sourceTokenAnswer } from './answers/source-answers.ts';
import { Conflict, NotFound } from './refusals.ts';
import { BadRequest } from './request-schemas.ts';
import { route, type AnyRoute } from './route.ts';

export interface SourceRouteHost {
  readonly sources: SourceRegister;
  readonly isConnected: (source: Pick<Source, 'id'>) => boolean;
  /** Ends connections by tokens that are not taken any more. */
  readonly endWithdrawn: () => Promise<void>;
}

const id = v.pipe(v.string(), v.maxLength(64));
const why = v.pipe(v.string('a reason'), v.trim(), v.minLength(1, 'a reason'), v.maxLength(500, 'at most 500 characters'));
const by = v.optional(v.pipe(v.string(), v.trim(), v.minLength(1), v.maxLength(80)));
const makeRequest = v.strictObject({ name: id, stations: v.pipe(v.array(id), v.maxLength(1_000)), products: v.optional(v.pipe(v.array(id), v.maxLength(1_000))), why, by });
const renewRequest = v.strictObject({ overlapHours: v.optional(v.pipe(v.number('hours, 0 to 720'), v.minValue(0), v.maxValue(720)), 0), why, by });
const withdrawRequest = v.strictObject({ why, by });
const nameParams = v.object({ name: id });

const manages = { action: 'manage-sources', at: 'plant' } as const;

/** Who may send records, for those who manage sources. */
export function sourceRoutes(host: SourceRouteHost): readonly AnyRoute[] {
  const { sources } = host;
  return [
    route({ method: 'GET', path: '/api/sources', summary: 'All sources', needs: manages, answer: sourcesAnswer, handle: async () => (await sources.list()).map((source) => shown(source, host.isConnected(source))) }),
    route({
      method: 'POST', path: '/api/sources', summary: 'Makes a source; its token is shown this once', needs: manages, body: makeRequest, answer: sourceTokenAnswer,
      handle: async ({ body: { name, stations, products, why, by }, caller }) => {
        const { source, token } = await told(sources.add({ name, stations, products, at: Date.now(), doer: { who: actingName(caller, by), why } }));
        return { source: shown(source, false), token };
      },
    }),
    route({
      method: 'POST', path: '/api/sources/:name/renew', summary: 'A new token for a source; the old one may hold for a while beside it', needs: manages, params: nameParams, body: renewRequest, answer: sourceTokenAnswer,
      handle: async ({ params: { name }, body: { overlapHours, why, by }, caller }) => {
        const oldUntil = overlapHours === 0 ? undefined : Date.now() + Math.round(overlapHours * 3_600_000);
        const { source, token } = await told(sources.rotate({ name, oldUntil, doer: { who: actingName(caller, by), why } }));
        await host.endWithdrawn();
        return { source: shown(source, host.isConnected(source)), token };
      },
    }),
    route({
      method: 'POST', path: '/api/sources/:name/withdraw', summary: 'Refuses a source from now on, and ends its connection', needs: manages, params: nameParams, body: withdrawRequest, answer: sourceAnswer,
      handle: async ({ params: { name }, body: { why, by }, caller }) => {
        const source = await told(sources.revoke(name, Date.now(), { who: actingName(caller, by), why }));
        await host.endWithdrawn();
        return shown(source, false);
      },
    }),
  ];
}

const shown = ({ id, name, stations, products, created, lastUsed, revoked, oldUntil }: Source, connected: boolean): v.InferOutput<typeof sourceAnswer> => ({
  id, name, stations: [...stations], products: [...products], made: created, lastUsed: lastUsed ?? null, revoked: revoked ?? null, oldTokenUntil: oldUntil ?? null, connected,
});

/** The register's refusals, as a request hears them. */
async function told<T>(asked: Promise<T>): Promise<T> {
  try {
    return await asked;
  } catch (cause) {
    if (!(cause instanceof StoreError)) throw cause;
    if (cause.fault === 'unknown-source') throw new NotFound(cause.message);
    if (cause.fault === 'name-taken') throw new Conflict(cause.message);
    if (cause.fault === 'bad-source') throw new BadRequest(cause.message.split(':')[0] ?? '', cause.message);
    throw cause;
  }
}
