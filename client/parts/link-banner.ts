import { css, html, LitElement, nothing, type TemplateResult } from 'lit';
import type { Freshness } from '../feed/link.ts';
import type { LivePicture } from '../feed/live-picture.ts';
import type { Formats } from '../format.ts';
import { base } from '../look/base.ts';

/** Says when the figures are not live, and when the plant is a demo whose clock runs faster. */
export class LinkBanner extends LitElement {
  static override properties = {
    picture: { attribute: false },
    freshness: { attribute: false },
    formats: { attribute: false },
    plantNow: { attribute: false },
  };

  static override styles = [base, css`
    p { padding: 0.5rem 0.9rem; border-radius: 6px; margin-bottom: 0.7rem; }
    .lost { background: var(--ink); color: var(--paper); font-weight: 600; font-size: 1.1rem; }
    .demo { color: var(--quiet); border: 1px dashed var(--edge); padding-block: 0.25rem; font-size: 0.93rem; }
    :host-context(html.wall) .lost { font-size: 1.8rem; }
    :host-context(html.wall) .demo { font-size: 0.85rem; }
  `];

  declare picture: LivePicture | undefined;
  declare freshness: Freshness | undefined;
  declare formats: Formats | undefined;
  declare plantNow: number;

  protected override render(): TemplateResult {
    return html`<div role="status">${this.#notLive()}</div>${this.#demo()}`;
  }

  #notLive(): TemplateResult | typeof nothing {
    const { freshness, formats, picture } = this;
    if (freshness === undefined || formats === undefined || picture === undefined) return nothing;
    const since = `What you see is last known, of ${formats.clock(picture.clock.at)} plant time.`;
    switch (freshness.kind) {
      case 'live':
      case 'connecting':
        return nothing;
      case 'silent':
        return html`<p class="lost">Not live: the server is silent. ${since}</p>`;
      case 'lost':
        return html`<p class="lost">Connection lost. ${since} Trying again.</p>`;
      case 'stopping':
        return html`<p class="lost">The server is going down: ${freshness.reason}. ${since}</p>`;
    }
  }

  #demo(): TemplateResult | typeof nothing {
    const { picture, formats } = this;
    if (picture === undefined || formats === undefined || (!picture.demo && picture.clock.rate === 1)) return nothing;
    const pace = picture.clock.rate === 1 ? '' : ` Its clock runs ${formats.count(picture.clock.rate)} times as fast as yours.`;
    return html`<p class="demo">Demo plant: nothing here is real.${pace}</p>`;
  }
}

customElements.define('link-banner', LinkBanner);
