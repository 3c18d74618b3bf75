import { css } from 'lit';

/** Forms: a label above its field, what is wanted below it, what is wrong beside it. */
export const form = css`
  form { display: grid; gap: 0.95rem; }
  .field { display: grid; grid-template-columns: minmax(0, 1fr); gap: 0.25rem; min-width: 0; }
  .field > label, legend { font-weight: 650; padding: 0; }
  .hint { color: var(--quiet); font-size: 0.93rem; text-wrap: pretty; }
  .fault { color: var(--harm); font-weight: 600; }
  .fault:empty { display: none; }
  .beside { display: grid; grid-template-columns: minmax(0, 1fr) auto; }
  .beside input { border-top-right-radius: 0; border-bottom-right-radius: 0; }
  .beside input:focus-visible { z-index: 1; }
  .beside button { border-top-left-radius: 0; border-bottom-left-radius: 0; border-left: 0; }
  [aria-invalid='true'] { border-color: var(--harm-mark); box-shadow: inset 3px 0 0 var(--harm-mark); }
  .does { display: flex; gap: 0.6rem; flex-wrap: wrap; align-items: center; }
  .does.end { justify-content: flex-end; }
  fieldset { border: 0; margin: 0; padding: 0; min-width: 0; }
  .tick { display: flex; gap: 0.55rem; align-items: baseline; font-weight: 400; padding-block: 0.25rem; }
  .tick input, td input[type='checkbox'] { width: 1.15em; height: 1.15em; flex: none; margin: 0; accent-color: var(--ink); translate: 0 0.15em; }
  .narrow { max-width: 10rem; }
  @media (pointer: coarse) { input, select { min-height: 48px; } .tick { padding-block: 0.5rem; } .tick input { min-height: 0; } }
`;
