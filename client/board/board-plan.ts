import { allowanceScale, type AllowanceScale } from './allowance-scale.ts';
import type { LaneForm } from './board-lane.ts';
import type { Room } from './board-room.ts';
import type { Lane } from './lane.ts';
import { laneHeights, laneSizeOf, type HeightLimits, type LaneSize } from './lane-heights.ts';

/** Height, size and type of a lane, px. */
export interface LaneMeasure {
  readonly height: number;
  readonly size: LaneSize;
  readonly typePx: number;
  /** Type of the name, where it differs: on a wall the longest name decides. */
  readonly nameTypePx: number;
}

/** How the board is laid out in the room it has. */
export interface BoardPlan {
  readonly form: LaneForm;
  readonly columns: string;
  readonly scale: AllowanceScale;
  readonly loud: LaneMeasure;
  readonly calm: LaneMeasure;
  readonly fits: boolean;
}

/** Width of the board below which lanes become cards, in widths of ordinary type. */
const cardBelow = 60;

export function columnsOf(form: LaneForm, width: number, typePx: number): readonly number[] {
  if (form === 'card') return [0, width, 0, 0, 0];
  if (form === 'wall') return [width * 0.25, width * 0.37, width * 0.215, width * 0.165, 0];
  const tight = width < typePx * 78;
  const who = typePx * (tight ? 13 : 16.5);
  const state = typePx * (tight ? 14 : 20);
  const figure = typePx * (tight ? 8.5 : 9.5);
  const act = typePx * (tight ? 9.6 : 10.2);
  return [who, width - who - state - figure - act, state, figure, act];
}

const limitsFor = (form: LaneForm, room: Room): HeightLimits =>
  form === 'wall'
    ? { loudLeast: room.height * 0.058, calmLeast: Math.max(24, room.height * 0.0125), loudMost: room.height * 0.2, calmMost: room.height * 0.14, louder: 2.1 }
    : { loudLeast: room.typePx * 5.2, calmLeast: room.typePx * 1.9, loudMost: room.typePx * 8, calmMost: room.typePx * 5.2, louder: 1.6 };

/** On a wall the words grow with their lane, up to what the name and the state still fit into. */
function wallMeasure(height: number, nameChars: number, nameWidth: number): LaneMeasure {
  const byName = nameWidth / (Math.max(12, nameChars) * 0.54 + 1.6);
  const two = Math.min(height * 0.33, nameWidth * 0.082);
  const one = Math.min(height * 0.62, byName * 0.7);
  return height > 92
    ? { height, size: 'medium', typePx: two, nameTypePx: Math.min(two, byName) }
    : { height, size: 'small', typePx: one, nameTypePx: one };
}

/**
 * @param extra   px of the room that group headings and the foot take
 * @param before  the plan until now: its scale is kept while the width is the same
 */
export function boardPlan(room: Room, lanes: readonly Lane[], wall: boolean, extra: number, before?: BoardPlan): BoardPlan {
  const form: LaneForm = wall ? 'wall' : room.width < room.typePx * cardBelow ? 'card' : 'desk';
  const columns = columnsOf(form, room.width, room.typePx);
  const loud = lanes.filter((lane) => lane.needsPerson).length;
  const heights = laneHeights(Math.max(0, room.height - extra), loud, lanes.length - loud, limitsFor(form, room));
  const measure = (height: number, needing: boolean): LaneMeasure => {
    const longest = Math.max(...lanes.filter((lane) => lane.needsPerson === needing).map((lane) => lane.card.name.length), 0);
    if (form === 'card') return { height: Math.round(room.typePx * 3), size: 'large', typePx: room.typePx, nameTypePx: room.typePx };
    if (form === 'wall') return wallMeasure(height, longest, columns[0] ?? 0);
    const size = laneSizeOf(height, room.typePx * 1.25);
    const typePx = room.typePx * (size === 'small' ? 0.93 : 1);
    return { height, size, typePx, nameTypePx: typePx };
  };
  const width = Math.max(120, Math.round(columns[1] ?? 0));
  return {
    form,
    columns: columns.filter((width) => width > 0).map((width) => `${Math.round(width)}px`).join(' '),
    scale: before?.scale.width === width ? before.scale : allowanceScale(width),
    loud: measure(heights.loud, true),
    calm: measure(heights.calm, false),
    fits: heights.fits,
  };
}
