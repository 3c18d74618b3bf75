import { css } from 'lit';

export const guaranteePageStyle = css`
  :host { display: grid; gap: 0.8rem; }
  .part { padding: 0.9rem 1.15rem 1rem; }
  h2 { font-size: 1.05rem; }
  .head { padding: 1rem 1.25rem 0.4rem; display: grid; grid-template-columns: minmax(0, 1fr) minmax(0, 1.1fr); gap: 0.4rem 2rem; align-items: start; }
  .head.care { background: var(--care-tint); }
  .head.harm { background: var(--harm-tint); }
  .head.care .quiet, .head.harm .quiet { color: var(--ink); }
  .head h1 { font-size: 1.9rem; letter-spacing: -0.01em; margin: 0.1rem 0 0.2rem; }
  .head own-lane { grid-column: 1 / -1; }
  .word { font-size: 1.5rem; font-weight: 700; display: flex; align-items: center; gap: 0.45em; flex-wrap: wrap; line-height: 1.25; margin-bottom: 0.2rem; }
  .word svg { width: 0.95em; height: 0.95em; }
  .word b { margin-left: auto; }
  .care .word { color: var(--care); }
  .harm .word { color: var(--harm); }
  .warning { border-left: 2px solid var(--ink); padding-left: 0.7em; margin-top: 0.4rem; }
  .columns { display: grid; grid-template-columns: minmax(0, 1fr) 22rem; gap: 0.8rem; align-items: start; }
  .main, .side, .alarms { display: grid; gap: 0.8rem; min-width: 0; }
  .over { display: flex; align-items: center; gap: 1rem; justify-content: space-between; flex-wrap: wrap; margin-bottom: 0.3rem; }
  fieldset { border: 1.5px solid var(--edge); border-radius: 5px; margin: 0; padding: 0; display: flex; overflow: clip; }
  label { position: relative; padding: 0.25em 0.75em; font-weight: 600; cursor: pointer; display: grid; place-items: center; white-space: nowrap; }
  label + label { border-left: 1px solid var(--edge); }
  label input { position: absolute; inset: 0; opacity: 0; cursor: pointer; width: 100%; }
  label:has(:checked) { background: var(--button); color: var(--button-ink); }
  label:has(:focus-visible) { outline: 3px solid var(--focus); outline-offset: -3px; }
  summary { cursor: pointer; padding: 0.4rem 0; font-weight: 600; }
  .events { display: grid; gap: 0.25rem; max-height: 22rem; overflow: auto; }
  .events li { display: grid; grid-template-columns: 1.5rem 8.5rem 1fr; gap: 0.6rem; align-items: baseline; }
  .letter { border: 1px solid var(--edge); border-radius: 3px; text-align: center; font-weight: 700; font-size: 0.8rem; }
  .fault { color: var(--harm); font-weight: 600; }
  .figures { margin-top: 0.4rem; }
  .figures div { display: flex; justify-content: space-between; gap: 1rem; border-top: 1px solid var(--rule); padding: 0.28rem 0; }
  .figures dt { color: var(--quiet); }
  .figures dd { text-align: right; }
  .figures b { font-size: 1.15em; }
  .gauge { display: block; width: 100%; height: 1.1rem; border: 1.5px solid var(--edge); border-radius: 3px; margin-top: 0.6rem; }
  .gauge rect { fill: var(--calm); }
  .gauge line { stroke: var(--edge); vector-effect: non-scaling-stroke; }
  .alarmed .gauge rect { fill: var(--care); }
  .lately { display: block; width: 100%; height: 3.2rem; border-bottom: 1.5px solid var(--edge); border-top: 1px dashed var(--edge); margin-top: 0.3rem; }
  .lately line { stroke: var(--rule); vector-effect: non-scaling-stroke; }
  .lately path { fill: none; stroke: var(--calm); stroke-width: 2; vector-effect: non-scaling-stroke; stroke-linejoin: round; }
  .ends { display: flex; justify-content: space-between; font-size: 0.86rem; margin-bottom: 0.4rem; }
  .how p { max-width: 80ch; margin: 0.3rem 0 0.5rem; }
  .how dl div { display: grid; grid-template-columns: 6rem 1fr; gap: 0.8rem; border-top: 1px solid var(--rule); padding: 0.45rem 0; }
  .how dt { color: var(--quiet); }
  .how dd { max-width: 78ch; }
  .how li + li { margin-top: 0.2rem; }
  @media (max-width: 1000px) { .columns { grid-template-columns: minmax(0, 1fr); } .side { order: -1; } }
  @media (max-width: 760px) {
    .head { grid-template-columns: minmax(0, 1fr); padding: 0.8rem 0.9rem 0.3rem; }
    .part { padding: 0.8rem 0.9rem; }
    .columns, .side, .main { display: contents; }
    .main > * { order: 2; }
    .figures-part { order: 3; }
    .change-part { order: 3; }
    .restart-part { order: 4; }
    fieldset { width: 100%; }
    label { flex: 1; padding: 0.7em 0.1em; }
    .how dl div { grid-template-columns: 1fr; gap: 0; }
    .events li { grid-template-columns: 1.5rem 1fr; }
    .events li span:last-child { grid-column: 2; }
  }
`;
