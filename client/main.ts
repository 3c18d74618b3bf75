import { interval, map, share } from 'rxjs';
import { VouchlineApp } from './app.ts';
import { serverDesk } from './desk.ts';
import { liveStateOf } from './feed/live-state.ts';
import { messagesOf } from './feed/socket-messages.ts';
import { settingsIn } from './settings.ts';

const now = (): number => performance.now();
const liveUrl = new URL('/live', location.href);
liveUrl.protocol = location.protocol === 'https:' ? 'wss:' : 'ws:';

document.body.prepend(
  new VouchlineApp({
    live$: liveStateOf({ messages: (watch) => messagesOf(liveUrl.href, watch), now, chance: Math.random }),
    desk: serverDesk,
    settings: settingsIn(localStorage),
    now,
    // one beat for every age on the page
    ticks$: interval(500).pipe(map(now), share()),
  }),
);
