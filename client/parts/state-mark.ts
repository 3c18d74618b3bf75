import { svg, type SVGTemplateResult } from 'lit';
import type { EvidenceState } from '../../core/evidence/evidence-state.ts';

/** A mark of its own shape for each state, in a 16 by 16 field; told apart without colour. */
export function stateMark(state: EvidenceState): SVGTemplateResult {
  switch (state) {
    case 'demonstrated':
      return svg`<path d="M3 8.5l3.5 3.5L13 4.5" fill="none" stroke="currentColor" stroke-width="2.4" stroke-linecap="round" stroke-linejoin="round"/>`;
    case 'gathering':
      return svg`<circle cx="3" cy="8" r="1.8" fill="currentColor"/><circle cx="8" cy="8" r="1.8" fill="currentColor"/><circle cx="13" cy="8" r="1.8" fill="currentColor"/>`;
    case 'undecided':
      return svg`<circle cx="8" cy="8" r="6" fill="none" stroke="currentColor" stroke-width="2"/><path d="M8 2a6 6 0 0 1 0 12z" fill="currentColor"/>`;
    case 'violated':
      return svg`<path d="M8 .8L15.2 8 8 15.2.8 8z" fill="currentColor"/>`;
    case 'unknown':
      return svg`<rect x="1.6" y="1.6" width="12.8" height="12.8" rx="2" fill="none" stroke="currentColor" stroke-width="1.8" stroke-dasharray="3 2.2"/><path d="M6 6.3a2 2 0 1 1 2.8 1.9c-.6.3-.8.6-.8 1.3M8 11.6v.4" fill="none" stroke="currentColor" stroke-width="1.8" stroke-linecap="round"/>`;
  }
}
