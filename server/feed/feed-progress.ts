import type { WriteStream } from 'node:tty';
import { repeatEvery } from '../repeat-every.ts';
import type { Feed } from './feed.ts';

/** How far the text is read. */
export interface ReadSoFar {
  readonly bytes: number | undefined;
  readonly read: () => number;
}

const terminalMs = 200;
const logMs = 5_000;

/** Tells on standard error how a feed goes on: a line that is written over on a terminal, else a line now and then. */
export class FeedProgress {
  readonly #out: NodeJS.WriteStream | WriteStream;
  readonly #text: ReadSoFar;
  readonly #feed: Feed;
  readonly #stop: () => void;
  #told = false;

  constructor(out: NodeJS.WriteStream | WriteStream, text: ReadSoFar, feed: Feed) {
    this.#out = out;
    this.#text = text;
    this.#feed = feed;
    this.#stop = repeatEvery(out.isTTY ? terminalMs : logMs, () => this.#tell());
    let broken = false;
    feed.watch((event) => {
      if (event.kind === 'broken') {
        broken = true;
        this.#line(`The connection failed: ${event.why}; again in ${(event.retryMs / 1000).toFixed(1)} s`);
      } else if (event.kind === 'connected') {
        this.#line(`${broken ? 'Connected again' : 'Connected'} as ${event.welcome.source}; the server expects sequence ${event.welcome.next}`);
      } else if (event.kind === 'begun') {
        this.#line(`The first row ${event.numbered ? 'gets' : 'has'} sequence ${event.first}`);
      }
    });
  }

  end(): void {
    this.#stop();
    if (this.#out.isTTY && this.#told) this.#out.write('\n');
  }

  /** A line that stays. */
  #line(text: string): void {
    this.#out.write(`${this.#out.isTTY ? '\r\u001B[2K' : ''}${text}\n`);
  }

  #tell(): void {
    this.#told = true;
    const { sent, repeated, next, seconds } = this.#feed.sums;
    const { bytes, read } = this.#text;
    const share = bytes === undefined || bytes === 0 ? '' : `${Math.floor((100 * read()) / bytes)} %  `;
    const text = `${share}${sent} records sent${repeated > 0 ? `, ${repeated} known already` : ''}; below ${next} on disk; ${Math.round(sent / Math.max(seconds, 0.001))} a second`;
    if (this.#out.isTTY) this.#out.write(`\r\u001B[2K${text.slice(0, this.#out.columns - 1)}`);
    else this.#out.write(`${text}\n`);
  }
}
