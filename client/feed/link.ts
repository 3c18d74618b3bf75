/** How the connection stands; times are ms of this browser's steady clock. */
export type Link =
  | { readonly kind: 'connecting' }
  | { readonly kind: 'open'; readonly heardAt: number }
  | { readonly kind: 'lost'; readonly since: number; readonly retryAt: number }
  | { readonly kind: 'stopping'; readonly reason: string; readonly since: number };

/** Whether what is shown is live; never 'live' by default. */
export type Freshness =
  | { readonly kind: 'connecting' }
  | { readonly kind: 'live' }
  | { readonly kind: 'silent'; readonly forMs: number }
  | { readonly kind: 'lost'; readonly forMs: number; readonly retryInMs: number }
  | { readonly kind: 'stopping'; readonly reason: string };

/** The server says something every second; three without a word and the figures are no longer called live. */
export const silentAfterMs = 3000;

export function freshnessOf(link: Link, now: number): Freshness {
  switch (link.kind) {
    case 'connecting':
      return link;
    case 'open':
      return now - link.heardAt > silentAfterMs ? { kind: 'silent', forMs: now - link.heardAt } : { kind: 'live' };
    case 'lost':
      return { kind: 'lost', forMs: Math.max(0, now - link.since), retryInMs: Math.max(0, link.retryAt - now) };
    case 'stopping':
      return { kind: 'stopping', reason: link.reason };
  }
}
