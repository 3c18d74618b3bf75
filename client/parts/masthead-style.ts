import { css } from 'lit';

export const mastheadStyle = css`
  .head { display: grid; grid-template-columns: 1fr auto auto; gap: 0.1rem 0.3rem; align-items: center; padding: 0.75rem 0 0.7rem; }
  .says { font-size: 1.6rem; font-weight: 750; line-height: 1.15; letter-spacing: -0.01em; text-wrap: balance; }
  .says { overflow-wrap: anywhere; min-width: 0; }
  nav { display: flex; gap: 0.3rem; align-items: center; }
  nav a { padding: 0.35rem 0.75rem; border-radius: 5px; text-decoration: none; font-weight: 650; white-space: nowrap; }
  nav a:hover { background: var(--raised); }
  nav a[aria-current='page'] { box-shadow: inset 0 -3px 0 var(--ink); border-radius: 5px 5px 0 0; }
  dl { grid-column: 1 / -1; display: flex; flex-wrap: wrap; gap: 0 1.6rem; color: var(--quiet); }
  .mark { color: var(--ink); font-weight: 700; }
  .clock { color: var(--ink); font-weight: 600; }
  .live, .not-live { color: var(--ink); white-space: nowrap; }
  .not-live { background: var(--ink); color: var(--paper); padding: 0 0.5em; border-radius: 3px; }
  .live svg, .not-live svg { width: 0.7em; height: 0.7em; margin-right: 0.4em; }
  .live > svg { color: var(--calm); }
  @media (max-width: 760px) {
    .head { grid-template-columns: minmax(0, 1fr) auto; gap: 0.45rem; align-items: start; }
    .says { grid-column: 1 / -1; }
    nav { order: 3; grid-column: 1 / -1; justify-content: space-between; }
    dl { grid-column: 1 / -1; grid-row: 2; }
    .mark { flex-basis: 100%; }
    person-menu { grid-column: 2; grid-row: 2; margin: -0.7rem -0.6rem 0 0; z-index: 8; }
    nav a { padding: 0.75rem 0.75rem; }
    dl { gap: 0 1rem; }
  }
  :host([wall]) .head { grid-template-columns: 1fr auto auto auto; padding: 0.8rem 0 0.8rem; column-gap: 2rem; }
  :host([wall]) .says { font-size: 3.5rem; }
  :host([wall]) .mark { display: none; }
  :host([wall]) nav, :host([wall]) person-menu { order: 3; opacity: 0.85; }
  :host([wall]) nav a { display: none; }
  :host([wall]) dl { grid-column: auto; font-size: 1.2rem; display: grid; grid-template-columns: auto auto; gap: 0 1.6rem; justify-items: end; align-items: center; line-height: 1.2; }
  :host([wall]) dl .time { grid-row: 1 / 3; grid-column: 2; }
  :host([wall]) .clock { font-size: 3.5rem; line-height: 1; font-weight: 650; }
`;
