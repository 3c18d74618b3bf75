import { css } from 'lit';

export const historyChartStyle = css`
  .room { height: 24rem; }
  .none { padding: 2rem 0; }
  .readout { min-height: 1.4em; color: var(--quiet); font-size: 0.93rem; }
  svg { display: block; }
  .chart { border-radius: 4px; touch-action: pan-y; }
  text { font-family: var(--face); font-size: 12.5px; fill: var(--quiet); }
  .beyond { fill: var(--ink); opacity: 0.045; }
  .grid { stroke: var(--rule); stroke-width: 1; shape-rendering: crispEdges; }
  .hatch { stroke: var(--edge); stroke-width: 1.2; opacity: 0.6; }
  .line { stroke: var(--ink); stroke-width: 2.2; }
  .line-name, .name.strong { fill: var(--ink); font-weight: 650; }
  .line-name, .inside { paint-order: stroke; stroke: var(--sheet); stroke-width: 3px; stroke-linejoin: round; }
  path { fill: none; stroke-linejoin: round; }
  .bound { stroke: var(--calm); stroke-width: 3; }
  .bound.undecided { stroke: var(--care-mark); stroke-width: 4; }
  .bound.violated { stroke: var(--harm-mark); stroke-width: 5; }
  .bound.gathering { stroke-dasharray: 0.1 7; stroke-linecap: round; }
  .bound.unknown { stroke: var(--off); stroke-dasharray: 7 5; }
  .estimate { stroke: var(--quiet); stroke-width: 1.5; }
  .opposite { stroke: var(--quiet); stroke-width: 1.5; stroke-dasharray: 5 4; }
  .bar { fill: var(--calm); opacity: 0.55; }
  .stroke { stroke: var(--ink); stroke-width: 1.3; }
  .axis { stroke: var(--edge); stroke-width: 1; }
  .event line { stroke: var(--edge); stroke-width: 1; }
  .event.loud line { stroke: var(--harm-mark); stroke-dasharray: 2 3; }
  .event rect { fill: var(--raised); stroke: var(--edge); }
  .event text { font-size: 11px; font-weight: 700; fill: var(--ink); }
  .event.loud rect { fill: var(--harm-tint); stroke: var(--harm-mark); }
  .event.loud text { fill: var(--harm); }
  .cursor { stroke: var(--ink); stroke-width: 1; }
`;
