import { css } from 'lit';

/** Pages before one is in: one narrow sheet in the middle of the paper. */
export const door = css`
  :host { display: grid; min-height: 100vh; place-content: safe center; grid-template-columns: minmax(0, 25rem); padding: 1.5rem 0.9rem; }
  .mark { font-weight: 750; font-size: 1.05rem; margin-bottom: 0.6rem; }
  .sheet { padding: 1.3rem 1.4rem 1.5rem; display: grid; gap: 0.95rem; overflow-wrap: anywhere; }
  h1 { font-size: 1.6rem; letter-spacing: -0.01em; }
  .told { border-left: 3px solid var(--ink); padding-left: 0.8rem; font-weight: 600; }
  .first { min-height: 3rem; font-size: 1.05rem; }
  .others { display: grid; gap: 0.5rem; border-top: 1px solid var(--rule); padding-top: 0.95rem; }
`;
