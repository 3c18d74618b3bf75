import type { Lane } from './board/lane.ts';
import { written, type Formats } from './format.ts';
import { isWaiting } from './attention.ts';
import { counted, driftWord, marginWords, priorityWord, promiseWords, ruleWord, stateWord } from './words.ts';

/**
 * Everything the lane shows, as sentences for someone who hears the board.
 *
 * @param age  of the newest record, in words; undefined before the first
 */
export function laneSentence(formats: Formats, lane: Lane, age: string | undefined): string {
  const { card, view } = lane;
  const bound =
    view.bound === undefined
      ? 'No bound'
      : `${card.side === 'at-most' ? 'Upper' : 'Lower'} bound ${written(formats.figureBesideLine(card, view.bound))}`;
  const says = [
    `${card.name}, ${card.lineName}: ${stateWord[view.state]}`,
    `${bound}; promised ${promiseWords(formats, card)}; ${formats.confidence(card.confidence)} confidence, ${view.lookRule}`,
    view.allowance.bound === undefined ? undefined : `Allowance used ${formats.percent(view.allowance.bound)}`,
    view.state === 'unknown' ? view.remark : marginWords(formats, card, view),
    view.drift === undefined ? undefined : driftWord[view.drift],
    age === undefined ? 'No record yet' : `Newest record ${age} ago`,
    ...lane.alarms.map((alarm) => `Alarm, ${priorityWord[alarm.priority].toLowerCase()}, ${isWaiting(alarm) ? 'not acknowledged' : 'acknowledged'}: ${ruleWord[alarm.rule]}`),
    view.warnings.length > 0 ? counted(formats, view.warnings.length, 'warning') : undefined,
    card.safetyRelevant ? 'Safety-relevant: advisory only' : undefined,
  ];
  return says.filter((part) => part !== undefined).map((part) => part.replace(/\.$/, '')).join('. ') + '.';
}
