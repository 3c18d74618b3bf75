import { css } from 'lit';

/** Pages of people, displays, sources and the record: sheets of rows, each row what it is, what is known of it, what can be done. */
export const ownPage = css`
  :host { display: grid; gap: 0.9rem; }
  h1 { font-size: 1.4rem; margin-top: 0.3rem; }
  h2 { font-size: 1.1rem; }
  .lead { color: var(--quiet); max-width: 80ch; text-wrap: pretty; margin-top: -0.6rem; }
  .columns { display: grid; grid-template-columns: minmax(0, 1fr) minmax(0, 1fr); gap: 0.9rem; align-items: start; }
  .columns > div { display: grid; gap: 0.9rem; min-width: 0; }
  .aside { grid-template-columns: minmax(0, 1fr) 24rem; }
  .part { padding: 0.95rem 1.15rem 1.15rem; display: grid; gap: 0.75rem; align-content: start; overflow-wrap: anywhere; }
  .part p { max-width: 75ch; text-wrap: pretty; }
  .over { display: flex; gap: 0.5rem 1rem; align-items: center; justify-content: space-between; flex-wrap: wrap; }
  .rows > li { display: grid; grid-template-columns: minmax(0, 1fr) auto; gap: 0.3rem 1.2rem; align-items: center; border-top: 1px solid var(--rule); padding: 0.65rem 0; }
  .rows > li:last-child { padding-bottom: 0; }
  .rows b { font-weight: 700; }
  .rows .off { color: var(--quiet); }
  .rows .does { justify-content: flex-end; }
  .mark { display: inline-block; border: 1px solid var(--edge); border-radius: 3px; padding: 0 0.4em; font-size: 0.86rem; font-weight: 600; margin-left: 0.5em; vertical-align: 0.06em; }
  summary { cursor: pointer; font-weight: 650; padding: 0.35rem 0; }
  details form { margin-top: 0.5rem; }
  .empty { color: var(--quiet); }
  .failed { display: grid; gap: 0.5rem; justify-items: start; }
  .failed p { color: var(--harm); font-weight: 600; }
  .said:empty { display: none; }
  .said { font-weight: 600; }
  code { font-family: ui-monospace, 'DejaVu Sans Mono', monospace; font-size: 0.93em; }
  @media (pointer: coarse) { summary { padding: 0.9rem 0; } }
  @media (max-width: 1000px) { .columns, .aside { grid-template-columns: minmax(0, 1fr); } }
  @media (max-width: 760px) {
    .part { padding: 0.85rem 0.9rem 1rem; }
    .rows > li { grid-template-columns: minmax(0, 1fr); }
    .rows .does { justify-content: flex-start; }
    .rows .does button { flex: 1 1 auto; }
  }
`;
