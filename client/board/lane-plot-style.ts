import { css } from 'lit';

/** Colours of the lane's drawing; a host sets none of them. */
export const lanePlotStyle = css`
  svg.drawing { display: block; overflow: visible; }
  .beyond { fill: var(--ink); opacity: 0.035; }
  .tick { stroke: var(--rule); stroke-width: 1; shape-rendering: crispEdges; }
  .line { stroke: var(--ink); stroke-width: var(--line-pen, 2.5); }
  .marks { --pen: var(--calm); }
  .marks.care { --pen: var(--care-mark); }
  .marks.harm { --pen: var(--harm-mark); }
  .marks.unknown, .marks.blank { --pen: var(--off); }
  .whisker, .opposite, .more, .trail line { stroke: var(--pen); fill: none; }
  .more { stroke-width: 2.5; }
  .trail line { stroke: var(--trail); }
  .tip { fill: var(--pen); }
  .dot { fill: var(--sheet); stroke: var(--pen); }
  .gathering .whisker { stroke-linecap: round; }
  .gathering .tip, .unknown .tip { fill: var(--sheet); stroke: var(--pen); stroke-width: calc(var(--line-pen, 2.5) * 0.8); }
  @media (forced-colors: active) {
    .line, .whisker, .opposite, .dot, .more, .trail line { stroke: CanvasText; }
    .tip { fill: CanvasText; }
  }
`;
