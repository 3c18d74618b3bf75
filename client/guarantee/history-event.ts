import type { Happening } from '../../core/monitor/happening.ts';
import { counted, ruleWord, stateWord } from '../words.ts';
import type { Formats } from '../format.ts';

/** A happening as the time axis shows it: one letter on the axis, words in the list. */
export interface HistoryEvent {
  readonly at: number;
  readonly letter: string;
  readonly words: string;
  readonly loud: boolean;
}

const alarmWord = { raised: 'raised', again: 'came back', acknowledged: 'acknowledged', returned: 'back to normal', ended: 'ended' } as const;
const markWord = {
  changeover: 'Changeover', 'lot-start': 'Lot begins', 'lot-end': 'Lot ends', 'line-stopped': 'Line stopped', 'line-running': 'Line running',
} as const;
const markLetter = { changeover: 'C', 'lot-start': 'L', 'lot-end': 'L', 'line-stopped': 'S', 'line-running': 'S' } as const;

export function historyEvent(happening: Happening, formats: Formats): HistoryEvent {
  const { at } = happening;
  switch (happening.kind) {
    case 'evidence':
      return { at, letter: 'E', words: `Evidence: ${stateWord[happening.from].toLowerCase()} to ${stateWord[happening.to].toLowerCase()}`, loud: false };
    case 'alarm': {
      const by = happening.change === 'acknowledged' && 'acknowledgement' in happening.alarm.state ? ` by ${happening.alarm.state.acknowledgement.by}` : '';
      return { at, letter: 'A', words: `Alarm ${alarmWord[happening.change]}${by}: ${ruleWord[happening.alarm.rule].toLowerCase()}`, loud: happening.change === 'raised' || happening.change === 'again' };
    }
    case 'restart':
      return { at, letter: 'R', words: `Evidence restarted by ${happening.by}: ${happening.reason}`, loud: false };
    case 'run':
      return { at, letter: 'B', words: `Run ${happening.run} begins with ${happening.cause === 'lot' ? 'lot' : 'the changeover to'} ${happening.detail}`, loud: false };
    case 'line':
      return { at, letter: markLetter[happening.mark], words: `${markWord[happening.mark]}${happening.detail === '' ? '' : `: ${happening.detail}`}`, loud: false };
    case 'set-aside':
      return { at, letter: 'D', words: `${counted(formats, happening.records, 'record')} of ${happening.source} set aside: ${happening.reason}`, loud: false };
  }
}

/** Spans in which the line stood still, for hatching; a stop that has no end yet lasts until `to`. */
export function stoppedSpans(events: readonly Happening[], to: number): readonly (readonly [number, number])[] {
  const spans: (readonly [number, number])[] = [];
  let since: number | undefined;
  for (const event of events) {
    if (event.kind !== 'line') continue;
    if (event.mark === 'line-stopped') since ??= event.at;
    if (event.mark === 'line-running' && since !== undefined) {
      spans.push([since, event.at]);
      since = undefined;
    }
  }
  return since === undefined ? spans : [...spans, [since, to]];
}
