import { css } from 'lit';

export const alarmCardStyle = css`
  article { background: var(--sheet); border: 1px solid var(--rule); border-radius: 8px; padding: 0.85rem 1.1rem 1rem; display: grid; gap: 0.35rem; }
  :host([kind='raised']) article, :host([kind='acknowledged']) article { background: var(--care-tint); border-color: var(--care-mark); }
  :host([kind='raised'][priority='high']) article, :host([kind='acknowledged'][priority='high']) article { background: var(--harm-tint); border-color: var(--harm-mark); }
  .kind { display: flex; align-items: center; gap: 0.5em; font-weight: 700; flex-wrap: wrap; }
  :host([kind='raised']) .kind, :host([kind='acknowledged']) .kind { color: var(--care); }
  :host([kind='raised'][priority='high']) .kind, :host([kind='acknowledged'][priority='high']) .kind { color: var(--harm); }
  .kind svg { width: 1.1em; height: 1.1em; flex: none; }
  .state { margin-left: auto; font-weight: 600; color: var(--ink); font-size: 0.93em; }
  h3 { font-size: 1.25rem; }
  :host([brief]) h3 { font-size: 1.05rem; }
  h3 a { text-decoration-thickness: 1px; text-underline-offset: 0.18em; }
  .what { font-weight: 600; }
  .response { border-left: 2px solid var(--ink); padding-left: 0.8em; margin: 0.25rem 0; font-size: 1.05em; max-width: 70ch; white-space: pre-line; }
  .response b { display: block; font-size: 0.86rem; }
  .grounds { max-width: 80ch; }
  :host([kind='raised']) .quiet, :host([kind='acknowledged']) .quiet { color: var(--ink); }
  .caution { font-size: 0.86rem; max-width: 95ch; }
  .does { display: flex; gap: 0.6rem; flex-wrap: wrap; margin-top: 0.35rem; }
  .does button { min-height: 3rem; }
  :host([kind='ended']) article { padding-block: 0.6rem 0.7rem; gap: 0.15rem; }
  :host([kind='ended']) h3 { font-size: 1rem; }
  :host([kind='ended']) .kind { color: var(--quiet); font-weight: 600; font-size: 0.93rem; }
  :host([kind='ended']) .kind .state { color: var(--quiet); }
  @media (max-width: 760px) { .does button { flex: 1 1 100%; min-height: 3.5rem; } .state { margin-left: 0; flex-basis: 100%; } }
`;
