import type { GuaranteeCard } from '../core/view/guarantee-view.ts';
import { writeSpan } from './format-span.ts';
import type { ShareUnit } from './settings.ts';

/** A figure and the unit that stands behind it, apart so that the two can be set differently. */
export interface Figure {
  readonly text: string;
  readonly unit: string;
}

/** What figures of one guarantee need to be written. */
export type FigureCard = Pick<GuaranteeCard, 'scale' | 'side' | 'guaranteeLine' | 'target'>;

/** The one place where numbers become text: in the reader's locale, the plant's time zone and the chosen unit. */
export interface Formats {
  readonly shareUnit: ShareUnit;
  /** A figure in the guarantee's own scale; '–' where there is none. */
  readonly figure: (card: FigureCard, value: number | undefined) => Figure;
  /** As `figure`, with as many digits as it takes to tell it from the guarantee line: never rounded onto it. */
  readonly figureBesideLine: (card: FigureCard, value: number | undefined) => Figure;
  readonly count: (value: number) => string;
  /** Any other figure, four significant digits. */
  readonly plain: (value: number) => string;
  /** A part of a whole or an allowance as a whole per cent. */
  readonly percent: (share: number) => string;
  /** A confidence level told as a decimal text, without losing a digit: '0.9995' is 99.95 %. */
  readonly confidence: (level: string) => string;
  readonly span: (ms: number) => string;
  readonly clock: (at: number) => string;
  readonly minute: (at: number) => string;
  readonly day: (at: number) => string;
  /** A day with its year. */
  readonly date: (at: number) => string;
  readonly moment: (at: number) => string;
  /** To the second, with the year: for a record that is kept. */
  readonly instant: (at: number) => string;
}

/** A figure and its unit in one, held together at the end of a line. */
export const written = (figure: Figure): string => (figure.unit === '' ? figure.text : `${figure.text}\u00a0${figure.unit}`);

/** Decimals that leave three significant digits of `span`, at most 12. */
const decimalsFor = (span: number): number =>
  span > 0 && Number.isFinite(span) ? Math.min(12, Math.max(0, 2 - Math.floor(Math.log10(span)))) : 0;

interface Writing {
  readonly value: number;
  /** What three digits are counted from. */
  readonly span: number;
  readonly unit: string;
  readonly before?: string;
}

function writingOf(card: FigureCard, value: number, shareUnit: ShareUnit): Writing | Figure {
  switch (card.scale.kind) {
    case 'share':
      if (card.side === 'at-least') return { value: value * 100, span: (1 - value) * 100, unit: '%' };
      if (shareUnit === '%') return { value: value * 100, span: value * 100, unit: '%' };
      if (shareUnit === 'ppm') return { value: value * 1e6, span: value * 1e6, unit: 'ppm' };
      return value > 0 ? { value: 1 / value, span: 1 / value, unit: '', before: '1 in ' } : { text: 'none', unit: '' };
    case 'rate':
      return { value, span: value, unit: `per ${card.scale.per === 1 ? '' : `${card.scale.per} `}${card.scale.unit}` };
    case 'measure':
      return { value, span: Math.abs(card.guaranteeLine - card.target) || Math.abs(value), unit: card.scale.unit };
  }
}

function numberWriter(locale: string | undefined): (value: number, decimals: number) => string {
  const made = new Map<number, Intl.NumberFormat>();
  return (value, decimals) => {
    const writer = made.get(decimals) ?? new Intl.NumberFormat(locale, { maximumFractionDigits: decimals });
    made.set(decimals, writer);
    return writer.format(value);
  };
}

/** @param locale undefined: the runtime's own */
export function formatsFor(locale: string | undefined, timeZone: string, shareUnit: ShareUnit): Formats {
  const number = numberWriter(locale);
  const plain = new Intl.NumberFormat(locale, { maximumSignificantDigits: 4 });
  const time = (options: Intl.DateTimeFormatOptions): ((at: number) => string) => {
    const writer = new Intl.DateTimeFormat(locale, { timeZone, ...options });
    return (at) => writer.format(at);
  };

  const write = (card: FigureCard, value: number | undefined, more: number): Figure => {
    if (value === undefined || !Number.isFinite(value)) return { text: '–', unit: '' };
    const writing = writingOf(card, value, shareUnit);
    if ('text' in writing) return writing;
    const text = number(writing.value, Math.min(20, decimalsFor(writing.span) + more));
    return { text: `${writing.before ?? ''}${text}`, unit: writing.unit };
  };

  return {
    shareUnit,
    figure: (card, value) => write(card, value, 0),
    figureBesideLine: (card, value) => {
      const line = write(card, card.guaranteeLine, 3).text;
      let figure = write(card, value, 0);
      for (let more = 1; more <= 6 && value !== card.guaranteeLine && figure.text === line; more += 1) {
        figure = write(card, value, more);
      }
      return figure;
    },
    count: (value) => number(value, Number.isInteger(value) ? 0 : 2),
    plain: (value) => plain.format(value),
    percent: (share) => `${number(share * 100, 0)}\u00a0%`,
    confidence: (level) => `${number(Number(level) * 100, Math.max(0, level.length - 4))}\u00a0%`,
    span: (ms) => writeSpan(ms, (value) => number(value, 0)),
    clock: time({ hour: '2-digit', minute: '2-digit', second: '2-digit' }),
    minute: time({ hour: '2-digit', minute: '2-digit' }),
    day: time({ weekday: 'short', day: 'numeric', month: 'short' }),
    date: time({ day: 'numeric', month: 'short', year: 'numeric' }),
    moment: time({ day: 'numeric', month: 'short', hour: '2-digit', minute: '2-digit' }),
    instant: time({ day: 'numeric', month: 'short', year: 'numeric', hour: '2-digit', minute: '2-digit', second: '2-digit' }),
  };
}
