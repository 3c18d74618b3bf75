import { Ajv2020, type ValidateFunction } from 'ajv/dist/2020.js';
import type { Action } from '../../../core/access/action.ts';

/** A route as the description of the API tells it. */
export interface Described {
  readonly method: string;
  /** With parameters as {name}. */
  readonly path: string;
  readonly needs: { readonly action: Action; readonly at: 'plant' | 'somewhere' | 'the line it concerns' } | undefined;
}

interface Operation {
  readonly 'x-needs'?: Described['needs'];
  readonly responses: Readonly<Record<string, { readonly content?: Readonly<Record<string, { readonly schema?: object }>> }>>;
}
export interface Description {
  readonly paths: Readonly<Record<string, Readonly<Record<string, Operation>>>>;
  readonly components: { readonly schemas: { readonly Refusal: object } };
}

/** The description of the API, and what it says of answers. */
export class DescribedAnswers {
  readonly table: readonly Described[];
  readonly #description: Description;
  readonly #ajv = new Ajv2020({ strict: false, allErrors: true });
  readonly #compiled = new Map<string, ValidateFunction>();

  constructor(description: Description) {
    this.#description = description;
    this.table = Object.entries(description.paths).flatMap(([path, methods]) => Object.entries(methods).map(([method, of]) => ({ method: method.toUpperCase(), path, needs: of['x-needs'] })));
  }

  /** What about an answer is not as described; empty where all is. */
  async faults(method: string, path: string, answer: Response): Promise<readonly string[]> {
    const described = this.#description.paths[path]?.[method.toLowerCase()]?.responses[answer.status];
    if (described === undefined) return [`${answer.status} is not described`];
    const { content } = described;
    const text = await answer.text();
    if (content === undefined) return text === '' ? [] : [`nothing was described; got ${text}`];
    const type = (answer.headers.get('content-type') ?? '').split(';')[0]!;
    const form = content[type];
    if (form === undefined) return [`${type} is not described`];
    if (form.schema === undefined) return [];
    const key = `${method} ${path} ${answer.status}`;
    let check = this.#compiled.get(key);
    if (check === undefined) {
      check = this.#ajv.compile(answer.status < 300 ? form.schema : this.#description.components.schemas.Refusal);
      this.#compiled.set(key, check);
    }
    return check(JSON.parse(text)) ? [] : (check.errors ?? []).map(({ instancePath, message, params }) => `${instancePath} ${message ?? ''} ${JSON.stringify(params)}`);
  }
}
