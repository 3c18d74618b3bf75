import { html, type TemplateResult } from 'lit';
import { charactersIn, passwordLength } from '../../core/access/password-length.ts';
import type { FormSending } from './form-sending.ts';
import { fieldSays } from './text-field.ts';

export interface PasswordField {
  readonly name: string;
  readonly label: string;
  /** A new one shows how long it is; autofill tells the two apart. */
  readonly fresh: boolean;
}

function onShow(event: Event): void {
  const button = event.currentTarget;
  const input = button instanceof HTMLElement ? button.previousElementSibling : undefined;
  if (!(button instanceof HTMLButtonElement) || !(input instanceof HTMLInputElement)) return;
  const shows = input.type === 'password';
  input.type = shows ? 'text' : 'password';
  button.textContent = shows ? 'Hide' : 'Show';
  button.setAttribute('aria-pressed', String(shows));
}

/** How far a new password is, told while it is typed. */
export function passwordProgress(length: number): string {
  const { least, most } = passwordLength;
  if (length === 0) return `At least ${least} characters; any will do, length is what counts.`;
  if (length > most) return `${length} characters; at most ${most}.`;
  return length < least ? `${length} of at least ${least} characters.` : `${length} characters: long enough.`;
}

/** A password that can be shown while it is typed. */
export function passwordField(sending: FormSending, { name, label, fresh }: PasswordField, length: number, onLength: (length: number) => void): TemplateResult {
  const fault = sending.of(name);
  return html`<div class="field">
    <label for=${name}>${label}</label>
    <div class="beside">
      <input id=${name} name=${name} type="password" required autocomplete=${fresh ? 'new-password' : 'current-password'} spellcheck="false" autocapitalize="none"
        aria-invalid=${fault === '' ? 'false' : 'true'} aria-describedby="${name}-says"
        @input=${(event: Event) => {
          sending.typed(name);
          if (event.target instanceof HTMLInputElement) onLength(charactersIn(event.target.value));
        }} />
      <button type="button" aria-pressed="false" aria-label="Show ${label.toLowerCase()}" @click=${onShow}>Show</button>
    </div>
    ${fieldSays(name, fault, fresh ? passwordProgress(length) : undefined)}
  </div>`;
}
