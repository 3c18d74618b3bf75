import type { FastifyReply, FastifyRequest } from 'fastify';
import type { GenericSchema, InferOutput } from 'valibot';
import type { Action } from '../../core/access/action.ts';
import type { Caller } from '../access/caller.ts';

type Schema = GenericSchema;
type Read<S extends Schema | undefined> = S extends Schema ? InferOutput<S> : undefined;

/**
 * What a caller needs: a role for the action where it happens. 'somewhere': a role for any line is enough, and the
 * answer holds only what the caller may see.
 */
export interface Need<P = unknown> {
  readonly action: Action;
  /** Where: the plant, any place, or the line that the parameters speak of (undefined: the plant). @throws NotFound where there is no such thing */
  readonly at: 'plant' | 'somewhere' | ((params: P) => string | undefined);
}

/**
 * What is answered where all went well: JSON of a form (200), text of one of some media types (200), nothing (204), or the
 * way to somewhere else (302).
 */
export type Answer = Schema | { readonly media: readonly `${string}/${string}`[] } | 'nothing' | 'elsewhere';

/** What a route is asked, checked against its schemas. */
export interface Asked<P extends Schema | undefined, Q extends Schema | undefined, B extends Schema | undefined> {
  readonly params: Read<P>;
  readonly query: Read<Q>;
  readonly body: Read<B>;
  /** undefined only where a route needs nobody. */
  readonly caller: Caller;
  readonly request: FastifyRequest;
  readonly reply: FastifyReply;
}

/** One thing that can be asked over HTTP: how it is checked, who may, and how it is described. */
export interface Route<P extends Schema | undefined = undefined, Q extends Schema | undefined = undefined, B extends Schema | undefined = undefined> {
  readonly method: 'GET' | 'POST' | 'PUT' | 'DELETE';
  /** With parameters as :name. */
  readonly path: `/${string}`;
  /** A sentence without its full stop. */
  readonly summary: string;
  /** 'nobody': open to all. */
  readonly needs: Need<Read<P>> | 'nobody';
  readonly params?: P;
  readonly query?: Q;
  readonly body?: B;
  /** Largest body, bytes; 65,536 when absent. */
  readonly bodyBytes?: number;
  readonly answer: Answer;
  readonly handle: (asked: Asked<P, Q, B>) => unknown;
}

/** Any route, after its own types have been checked where it was written. */
export type AnyRoute = Omit<Route, 'needs' | 'params' | 'query' | 'body' | 'handle'> & {
  readonly needs: Need<never> | 'nobody';
  readonly params?: Schema | undefined;
  readonly query?: Schema | undefined;
  readonly body?: Schema | undefined;
  readonly handle: (asked: never) => unknown;
};

/** Writes a route down: its handler knows what its schemas let through. */
export function route<P extends Schema | undefined = undefined, Q extends Schema | undefined = undefined, B extends Schema | undefined = undefined>(
  described: Route<P, Q, B>,
): AnyRoute {
  return described;
}
