import { interval, map, share } from 'rxjs';
import { whoDesk } from './access/who-desk.ts';
import { VouchlineApp } from './app.ts';
import { askServer, type Ask } from './ask.ts';
import { serverDesk } from './desk.ts';
import { liveOfCaller } from './feed/live-of-caller.ts';
import { liveStateOf } from './feed/live-state.ts';
import { messagesOf } from './feed/socket-messages.ts';
import { settingsIn } from './settings.ts';

const now = (): number => performance.now();
const wall = (): number => Date.now();
const liveUrl = new URL('/live', location.href);
liveUrl.protocol = location.protocol === 'https:' ? 'wss:' : 'ws:';

const displayKey = 'vouchline-display';
const ask: Ask = askServer(() => { void who.refresh(); });
const who = whoDesk({
  ask,
  wall,
  chance: Math.random,
  display: {
    is: () => localStorage.getItem(displayKey) !== null,
    keep: (is) => { if (is) localStorage.setItem(displayKey, 'yes'); else localStorage.removeItem(displayKey); },
  },
});
void who.refresh();

document.body.prepend(
  new VouchlineApp({
    live$: liveOfCaller(who.who$, () => liveStateOf({ messages: (watch) => messagesOf(liveUrl.href, watch), now, chance: Math.random }), () => { void who.refresh(); }),
    who,
    ask,
    desk: serverDesk(ask),
    settings: settingsIn(localStorage),
    now,
    // one beat for every age on the page
    ticks$: interval(500).pipe(map(now), share()),
    wall,
  }),
);
