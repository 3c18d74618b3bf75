import { css } from 'lit';

export const runEvidenceStyle = css`
  :host { display: block; }
  h2 { font-size: 1.05rem; }
  .room, .chart { display: block; height: 210px; }
  .none { padding: 2rem 0; }
  .grid { stroke: var(--rule); }
  .tick { font-size: 12px; fill: var(--quiet); }
  .enough { stroke: var(--ink); stroke-width: 1.5; stroke-dasharray: 6 4; }
  .label { font-size: 12.5px; font-weight: 600; fill: var(--ink); paint-order: stroke; stroke: var(--sheet); stroke-width: 3px; }
  path { fill: none; stroke-width: 2.5; stroke-linejoin: round; }
  path.kept { stroke: var(--calm); }
  path.broken { stroke: var(--harm); stroke-dasharray: 2 3; }
  circle.kept { fill: var(--calm); stroke: var(--sheet); stroke-width: 1.5; }
  rect.broken { fill: var(--harm); stroke: var(--sheet); stroke-width: 1.5; }
  dl { margin-top: 0.4rem; display: grid; grid-template-columns: repeat(auto-fit, minmax(15rem, 1fr)); gap: 0 1.6rem; }
  dl div { display: flex; justify-content: space-between; gap: 1rem; border-top: 1px solid var(--rule); padding: 0.28rem 0; }
  dt { color: var(--quiet); }
  dd { text-align: right; font-weight: 600; }
  dd span { display: block; font-weight: 400; }
  i { display: inline-block; width: 1.4em; margin-right: 0.5em; vertical-align: 0.25em; border-top: 2.5px solid var(--calm); }
  i.broken { border-top: 2.5px dotted var(--harm); }
  summary { cursor: pointer; padding: 0.4rem 0; font-weight: 600; }
  details p { max-width: 80ch; margin: 0.3rem 0 0.5rem; }
`;
