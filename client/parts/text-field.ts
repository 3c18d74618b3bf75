import { html, nothing, type TemplateResult } from 'lit';
import type { FormSending } from './form-sending.ts';

export interface TextField {
  /** As in the body that is sent; refusals name it. */
  readonly name: string;
  readonly label: string;
  readonly type?: 'text' | 'password' | 'number' | 'datetime-local';
  /** What stands in it at first, and again when the form is emptied. */
  readonly value?: string;
  readonly hint?: string | TemplateResult;
  readonly autocomplete?: string;
  readonly required?: boolean;
  readonly most?: number;
  /** Ends of a number, both allowed. */
  readonly from?: number;
  readonly to?: number;
  readonly narrow?: boolean;
}

/** One labelled field with what is wanted below it and what is wrong beside it. */
export function textField(sending: FormSending, field: TextField): TemplateResult {
  const fault = sending.of(field.name);
  return html`<div class="field">
    <label for=${field.name}>${field.label}</label>
    <input class=${field.narrow === true ? 'narrow' : ''} id=${field.name} name=${field.name} type=${field.type ?? 'text'} value=${field.value ?? ''}
      autocomplete=${field.autocomplete ?? 'off'} spellcheck="false" autocapitalize="none" ?required=${field.required === true} maxlength=${field.most ?? nothing}
      min=${field.from ?? nothing} max=${field.to ?? nothing}
      aria-invalid=${fault === '' ? 'false' : 'true'} aria-describedby="${field.name}-says"
      @input=${() => { sending.typed(field.name); }} />
    ${fieldSays(field.name, fault, field.hint)}
  </div>`;
}

/** What is wrong with a field, or else what is wanted in it. */
export const fieldSays = (name: string, fault: string, hint: string | TemplateResult | undefined): TemplateResult => html`<div id="${name}-says">
  ${hint === undefined || fault !== '' ? nothing : html`<p class="hint">${hint}</p>`}<p class="fault" role="alert">${fault}</p></div>`;
