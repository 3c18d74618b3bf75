import { css } from 'lit';

export const lineBoardStyle = css`
  .board { overflow: clip; }
  .scale {
    display: grid; grid-template-columns: var(--columns); align-items: end; position: sticky; top: 0; z-index: 3;
    background: var(--sheet); font-size: 0.86rem; border-radius: 8px 8px 0 0;
  }
  .scale > span { padding: 0.5em 1.05em; }
  .scale > .end { text-align: right; }
  .scale > span:last-child { padding-right: 1.25em; }
  .scale.card { grid-template-columns: 1fr; }
  .scale.card > span { display: none; }
  .scale.wall { font-size: 0.9rem; }
  .scale text { fill: var(--quiet); font-family: var(--face); }
  .scale text.name { fill: var(--ink); font-weight: 700; }
  .lanes { position: relative; }
  /* Lanes out of sight cost nothing; a lane's height is set, so nothing jumps. */
  .lanes.many li { content-visibility: auto; }
  .group {
    display: flex; gap: 0.8em; align-items: baseline; font-size: 0.95rem; padding: 0.45rem 1.05rem 0.3rem;
    border-top: 1px solid var(--rule); background: var(--paper); height: 2.2rem;
  }
  .group .quiet { font-weight: 400; font-size: 0.9em; }
  :host([wall]) .group { height: 2.2rem; font-size: 1.1rem; }
  .foot { font-size: 0.86rem; padding: 0.6rem 0.3rem 0; max-width: 150ch; text-wrap: pretty; }
  :host([wall]) .foot { font-size: 0.8rem; max-width: none; padding-top: 0.35rem; }
  .foot strong { color: var(--ink); }
  .empty { padding: 2.2rem 2rem; max-width: 60ch; }
  .empty h2 { font-size: 1.35rem; margin-bottom: 0.4rem; }
  .empty.note { padding: 0.9rem 1.1rem; margin-bottom: 0.8rem; max-width: none; }
  .empty.note h2 { font-size: 1.05rem; margin-bottom: 0.1rem; }
`;
