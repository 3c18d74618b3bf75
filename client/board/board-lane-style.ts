import { css } from 'lit';

export const boardLaneStyle = css`
  :host { display: block; height: 100%; font-size: var(--lane-type, 1rem); }
  article {
    position: relative; height: 100%; display: grid; grid-template-columns: var(--columns);
    align-items: center; border-top: 1px solid var(--rule); background: var(--ground, transparent);
  }
  :host([tone='care']) article { --ground: var(--care-tint); }
  :host([tone='harm']) article { --ground: var(--harm-tint); }
  :host([tone='blank']) article {
    --ground: repeating-linear-gradient(135deg, transparent 0 7px, color-mix(in srgb, var(--ink) 5%, transparent) 7px 9px);
  }
  article:hover { box-shadow: inset 0 0 0 1.5px var(--edge); }
  article:has(a:focus-visible) { box-shadow: inset 0 0 0 3px var(--focus); }
  a { font-weight: 650; text-decoration: none; line-height: 1.2; }
  a:focus-visible { outline: none; }
  a::after { content: ''; position: absolute; inset: 0; }
  .who, .state, .figure, .act { padding: 0 0.9em; min-width: 0; display: grid; gap: 0.08em; line-height: 1.25; }
  .who { padding-left: 1.1em; }
  .figure { justify-items: end; text-align: right; white-space: nowrap; }
  .figure b { font-weight: 700; font-size: 1.08em; }
  .unit { font-size: 0.82em; font-weight: 600; margin-left: 0.3em; }
  .unit:empty { display: none; }
  .act { justify-items: end; text-align: right; padding-right: 1.1em; }
  .act button { position: relative; z-index: 1; padding-block: 0.15em; }
  .sub { font-size: 0.86em; color: var(--quiet); }
  :host([tone='care']) .sub, :host([tone='harm']) .sub, :host([tone='blank']) .sub { color: var(--ink); }
  .word { display: flex; align-items: center; gap: 0.45em; font-weight: 700; white-space: nowrap; }
  .mark { width: 1em; height: 1em; flex: none; margin-top: -0.12em; }
  :host([tone='calm']) .word { font-weight: 600; }
  :host([tone='calm']) .mark { color: var(--quiet); }
  :host([tone='care']) .word, :host([tone='care']) .figure b { color: var(--care); }
  :host([tone='harm']) .word, :host([tone='harm']) .figure b { color: var(--harm); }
  .alarm { font-weight: 650; }
  .place:empty { display: none; }
  .safety { font-weight: 650; color: var(--ink); }
  .plot { align-self: stretch; margin-top: -1px; min-width: 0; }

  :host([size='medium']) :is(.level, .alarm) { display: none; }
  :host([size='medium']:not([form='wall'])) .who:has(.safety) { grid-template-columns: auto 1fr; column-gap: 0.7em; }
  :host([size='medium']:not([form='wall'])) .who:has(.safety) a { grid-column: 1 / -1; }
  :host([size='small']) :is(.who, .state, .figure) { display: flex; align-items: baseline; gap: 0.6em; white-space: nowrap; }
  :host([size='small']) :is(.level, .alarm, .figure .sub, .known, .safety ~ .sub) { display: none; }
  :host([size='small']) .state { align-items: center; justify-content: space-between; }
  :host([size='small']) .state .standing { padding-right: 0.6em; }
  :host([size='small']) .safety { font-weight: 600; }
  :host([size='small']) .who :is(a, .sub) { overflow: hidden; text-overflow: ellipsis; min-width: 0; }
  :host([size='small']) .who .sub { flex: 0 1000 auto; }
  :host([size='small']) .figure { justify-content: flex-end; }
  :host([size='small']) .act { display: flex; align-items: center; justify-content: flex-end; gap: 0.5em; }
  :host([size='small']) .act:has(button) .age { display: none; }
  :host([size='small']) .act button { min-height: 0; line-height: 1.3; padding-block: 0; }
  :host([size='small']) .word .mark { align-self: center; }

  :host([form='wall']) { --line-pen: 6; }
  :host([form='wall']) .sub { font-size: 0.56em; }
  :host([form='wall'][size='medium']) a { font-size: var(--name-type, 1em); }
  :host([form='wall'][size='medium']) .who .sub { font-size: max(0.6em, calc(var(--name-type, 1em) * 0.56)); }
  :host([form='wall'][size='medium']) .safety { display: inline; }
  :host([form='wall']) .unit { font-size: 0.62em; }
  :host([form='wall']) :is(.standing, .alarm, .level) { display: none; }
  :host([form='wall']:not([tone='calm'])[size='medium']) .standing { display: block; }
  :host([form='wall'][size='small']) .who .sub { font-size: 0.8em; }
  :host([form='wall']) .who { white-space: nowrap; line-height: 1.12; }
  :host([form='wall']) article { border-top-width: 2px; }

  :host([form='card']) article {
    height: auto; grid-template: 'who who' auto 'plot plot' auto 'state figure' auto 'act act' auto / 1fr auto;
    padding: 0.7em 0 0.75em; row-gap: 0.35em; align-items: start;
  }
  :host([form='card']) .who { grid-area: who; padding-right: 1.1em; }
  :host([form='card']) .plot { grid-area: plot; }
  :host([form='card']) .state { grid-area: state; padding-left: 1.1em; padding-right: 0.4em; }
  :host([form='card']) .figure { grid-area: figure; padding-right: 1.1em; }
  :host([form='card']) .act {
    grid-area: act; display: flex; align-items: center; justify-content: space-between; text-align: left; flex-direction: row-reverse;
    padding-left: 1.1em;
  }
  :host([form='card']) .act button { min-height: 48px; padding-inline: 1.3em; }
`;
