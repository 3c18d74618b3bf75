import { createContext } from '@lit/context';
import type { Observable } from 'rxjs';
import type { WhoDesk } from './access/who-desk.ts';
import type { Ask } from './ask.ts';
import type { Desk } from './desk.ts';
import type { LiveState } from './feed/live-state.ts';
import type { SettingsDesk } from './settings.ts';

/** What the page was started with; elements take what they need from here. */
export interface Wiring {
  readonly live$: Observable<LiveState>;
  readonly who: WhoDesk;
  /** For the pages that are fetched when opened; they bring their own questions. */
  readonly ask: Ask;
  readonly desk: Desk;
  readonly settings: SettingsDesk;
  /** This browser's steady clock, ms, and its beat for ages that tick. */
  readonly now: () => number;
  readonly ticks$: Observable<number>;
  /** Wall time, ms since 1970. */
  readonly wall: () => number;
}

export const wiringContext = createContext<Wiring>(Symbol('wiring'));
