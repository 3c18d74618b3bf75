import type { ReactiveController, ReactiveControllerHost } from 'lit';
import { reasonOf, Refusal } from '../ask.ts';

/** Sends what a form says, once at a time, and keeps what was refused beside the field that the refusal names. */
export class FormSending implements ReactiveController {
  busy = false;
  readonly #host: ReactiveControllerHost & HTMLElement;
  #fault: { readonly field: string; readonly words: string } | undefined;

  constructor(host: ReactiveControllerHost & HTMLElement) {
    this.#host = host;
    host.addController(this);
  }

  hostDisconnected(): void {
    this.#fault = undefined;
  }

  /** Sends; false when it was refused, which `fault` then tells and the field shows. */
  async send(work: () => Promise<void>): Promise<boolean> {
    if (this.busy) return false;
    this.busy = true;
    this.#fault = undefined;
    this.#host.requestUpdate();
    try {
      await work();
      return true;
    } catch (cause) {
      this.refuse(cause instanceof Refusal ? (cause.field ?? fieldIn(cause.message)) : '', reasonOf(cause));
      return false;
    } finally {
      this.busy = false;
      this.#host.requestUpdate();
    }
  }

  /** Marks a field before anything is sent. @param words  a clause, with or without the field's name before it */
  refuse(field: string, words: string): void {
    const bare = words.startsWith(`${field}: `) ? words.slice(field.length + 2) : words;
    this.#fault = { field, words: `${bare.charAt(0).toUpperCase()}${bare.slice(1)}.` };
    this.#host.requestUpdate();
    void this.#host.updateComplete.then(() => this.#host.shadowRoot?.querySelector<HTMLElement>('[aria-invalid="true"]')?.focus());
  }

  /** Somebody types into a field: what was wrong with it no longer stands there. */
  typed(field: string): void {
    if (this.of(field) !== '') this.clear();
  }

  clear(): void {
    this.#fault = undefined;
    this.#host.requestUpdate();
  }

  /** What is wrong with a field; empty if nothing is. */
  of(field: string): string {
    return this.#fault !== undefined && rootOf(this.#fault.field) === field ? this.#fault.words : '';
  }

  /** What is wrong and belongs to none of the fields shown. */
  beyond(fields: readonly string[]): string {
    return this.#fault === undefined || fields.includes(rootOf(this.#fault.field)) ? '' : this.#fault.words;
  }
}

/** The field that a sentence names before its colon: 'name: somebody has this name already'. */
const fieldIn = (sentence: string): string => /^([a-z][A-Za-z0-9.]*): /.exec(sentence)?.[1] ?? '';

/** 'grants.0.role' is the field 'grants'. */
const rootOf = (field: string): string => field.split('.')[0] ?? '';

/** The texts of a form's fields, trimmed but for those that are secrets. */
export function textsOf(form: HTMLFormElement): (name: string) => string {
  const data = new FormData(form);
  return (name) => {
    const value = data.get(name);
    if (typeof value !== 'string') return '';
    return form.elements.namedItem(name) instanceof HTMLInputElement && secretKinds.has(name) ? value : value.trim();
  };
}

const secretKinds: ReadonlySet<string> = new Set(['password', 'old', 'new', 'pin']);

/** The form of a submit event, which is then not sent by the browser itself. */
export function formOf(event: SubmitEvent): HTMLFormElement | undefined {
  event.preventDefault();
  return event.target instanceof HTMLFormElement ? event.target : undefined;
}
