import { css } from 'lit';

/** What every element shares: box model, focus, buttons, words for screen readers only. */
export const base = css`
  *, *::before, *::after { box-sizing: border-box; }
  :host { display: block; box-sizing: border-box; }
  :host([hidden]), [hidden] { display: none !important; }
  h1, h2, h3, p, ol, ul, dl, dd, figure { margin: 0; padding: 0; }
  h1, h2, h3 { font-weight: 700; line-height: 1.2; text-wrap: balance; }
  ol, ul { list-style: none; }
  a { color: inherit; }
  :focus-visible { outline: 3px solid var(--focus); outline-offset: 2px; border-radius: 3px; }
  .quiet { color: var(--quiet); }
  .unseen {
    position: absolute; width: 1px; height: 1px; margin: -1px; overflow: hidden;
    clip-path: inset(50%); white-space: nowrap;
  }
  button, .button {
    font: inherit; font-weight: 650; color: var(--ink); background: var(--raised);
    border: 1.5px solid var(--edge); border-radius: 5px; padding: 0.35em 0.85em; min-height: 2.1em;
    cursor: pointer; touch-action: manipulation;
  }
  a.button { display: inline-grid; place-items: center; text-decoration: none; text-align: center; }
  button:hover, a.button:hover { border-color: var(--ink); }
  button.first { background: var(--button); color: var(--button-ink); border-color: var(--button); }
  button.plain { border-color: transparent; background: none; text-decoration: underline; text-underline-offset: 0.2em; }
  button:disabled { opacity: 0.55; cursor: default; }
  input, textarea, select {
    font: inherit; color: var(--ink); background: var(--raised); border: 1.5px solid var(--edge);
    border-radius: 5px; padding: 0.45em 0.6em; width: 100%;
  }
  .sheet { background: var(--sheet); border: 1px solid var(--rule); border-radius: 8px; }
  @media (pointer: coarse) { button, .button { min-height: 48px; padding-inline: 1.1em; } }
`;
