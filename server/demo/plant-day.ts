import type { LineId, ProductId } from '../../core/record/part.ts';
import { Chance } from './chance.ts';
import { hoseLines, type HoseLine } from './stations.ts';

/** A stream leaves its usual level: at once, or slowly from `from` to `until`, when it is repaired. Minutes of the day. */
export interface Trouble {
  readonly station: string;
  readonly characteristic: string;
  readonly from: number;
  readonly until: number;
  readonly course: 'sudden' | 'slow';
  /** The level it comes to. */
  readonly level: number;
}

/** A station cannot reach the server; what it inspects meanwhile waits in its buffer. */
export interface Silence {
  readonly station: string;
  readonly from: number;
  readonly until: number;
}

export interface Changeover {
  readonly line: LineId;
  /** Minute of the day at which the old product's last lot ends. */
  readonly at: number;
  readonly product: ProductId;
}

/** What happens on one day of the demo plant, beside its roster. */
export interface PlantDay {
  readonly troubles: readonly Trouble[];
  readonly silences: readonly Silence[];
  /** A station's buffer ran over: what it found in that minute is gone. */
  readonly losses: readonly { readonly station: string; readonly at: number }[];
  readonly changeovers: readonly Changeover[];
}

const clock = (hours: number, minutes = 0): number => hours * 60 + minutes;

/** Minutes of a day. */
export const dayMinutes = clock(24);

/** The first day is always told the same way: people are shown this one. */
const firstDay: PlantDay = {
  troubles: [
    { station: 'B.leak-test', characteristic: 'tightness', from: clock(6, 28), until: clock(6, 44), course: 'sudden', level: 0.02 },
    { station: 'B.crimping', characteristic: 'pull-off-force', from: clock(7), until: clock(11, 30), course: 'slow', level: 490 },
    { station: 'A.final-inspection', characteristic: 'finish', from: clock(8, 38), until: clock(9), course: 'sudden', level: 0.13 },
    { station: 'K.filling', characteristic: 'fill', from: clock(16, 10), until: clock(16, 40), course: 'sudden', level: 249 },
    { station: 'A.cutting', characteristic: 'surface', from: clock(18, 30), until: clock(20, 30), course: 'slow', level: 4 },
  ],
  silences: [{ station: 'A.leak-test', from: clock(10, 15), until: clock(10, 40) }],
  losses: [{ station: 'K.filling', at: clock(13, 10) }],
  changeovers: [
    { line: 'A', at: clock(9), product: 'BH-5' },
    { line: 'A', at: clock(15), product: 'BH-4' },
    { line: 'B', at: clock(13), product: 'BH-5' },
    { line: 'B', at: clock(21), product: 'BH-4' },
  ],
};

/** Faults that cross a guarantee line for a while, one by one; `on` is the line it befalls. */
type Fault = (on: HoseLine, from: number, chance: Chance) => Trouble;
const leak: Fault = (on, from, chance) => ({ station: `${on}.leak-test`, characteristic: 'tightness', from, until: from + 14 + chance.below(8), course: 'sudden', level: 0.02 });
const weakCrimp: Fault = (on, from, chance) => ({ station: `${on}.crimping`, characteristic: 'pull-off-force', from, until: from + 20 + chance.below(20), course: 'sudden', level: 478 });
const scratches: Fault = (on, from, chance) => ({ station: `${on}.cutting`, characteristic: 'surface', from, until: from + 40 + chance.below(20), course: 'sudden', level: 4.5 });
const badLabels: Fault = (on, from, chance) => ({ station: `${on}.final-inspection`, characteristic: 'finish', from, until: from + 18 + chance.below(8), course: 'sudden', level: 0.13 });
const wornDies: Fault = (on, from, chance) => ({ station: `${on}.crimping`, characteristic: 'pull-off-force', from, until: from + 220 + chance.below(60), course: 'slow', level: 488 });
const wornRollers: Fault = (on, from, chance) => ({ station: `${on}.cutting`, characteristic: 'surface', from, until: from + 180 + chance.below(60), course: 'slow', level: 3.6 });
const lowFill: Fault = (_, from, chance) => ({ station: 'K.filling', characteristic: 'fill', from, until: from + 25 + chance.below(15), course: 'sudden', level: 249 });

/**
 * What happens on a day. Every day has a sudden fault, a strong one, a slow one, a silence, a loss and two
 * changeovers a hose line; when and where differ.
 *
 * @param day whole, 0 for the first
 */
export function plantDay(seed: number, day: number): PlantDay {
  if (day === 0) return firstDay;
  const chance = new Chance(seed, 'day', day);
  const strong = chance.oneOf<HoseLine>(['A', 'B']);
  const other: HoseLine = strong === 'A' ? 'B' : 'A';
  const about = (hours: number): number => clock(hours) + chance.below(50);
  return {
    troubles: [
      chance.oneOf([leak, weakCrimp])(other, about(6), chance),
      chance.oneOf([wornDies, wornRollers])(other, about(9), chance),
      badLabels(strong, about(10), chance),
      chance.oneOf([lowFill, leak])(strong, about(15), chance),
      chance.oneOf([scratches, weakCrimp])(strong, about(18), chance),
    ],
    silences: [silence(chance.oneOf(['A.leak-test', 'B.leak-test', 'B.final-inspection', 'K.filling']), about(13), chance)],
    losses: [{ station: chance.oneOf(['K.filling', 'B.cutting', 'A.cutting']), at: about(17) }],
    changeovers: hoseLines.flatMap((line) => changeovers(line, chance)),
  };
}

const silence = (station: string, from: number, chance: Chance): Silence => ({ station, from, until: from + 15 + chance.below(15) });

/** To the thicker hose and back, where a lot ends anyway. */
function changeovers(line: LineId, chance: Chance): Changeover[] {
  const away = 7 + 2 * chance.below(4);
  return [
    { line, at: clock(away), product: 'BH-5' },
    { line, at: clock(away + 4 + 2 * chance.below(2)), product: 'BH-4' },
  ];
}
