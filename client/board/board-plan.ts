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
  const parts = form === 'wall' ? [0.235, 0.2, 0.145] : [];
  if (form === 'wall') return [width * 0.235, width * 0.42, width * (parts[1] ?? 0), width * (parts[2] ?? 0), 0];
  const tight = width < typePx * 78;
  const who = typePx * (tight ? 13 : 16.5);
  const state = typePx * (tight ? 13.5 : 18);
  const figure = typePx * (tight ? 8.5 : 9.5);
  const act = typePx * (tight ? 8.8 : 9.5);
  return [who, width - who - state - figure - act, state, figure, act];
}

const limitsFor = (form: LaneForm, room: Room): HeightLimits =>
  form === 'wall'
    ? { loudLeast: room.height * 0.058, calmLeast: Math.max(24, room.height * 0.0125), loudMost: room.height * 0.3, calmMost: room.height * 0.2 }
    : { loudLeast: room.typePx * 5.2, calmLeast: room.typePx * 1.9, loudMost: room.typePx * 8, calmMost: room.typePx * 5.2 };

/** On a wall the words grow with their lane, up to what the name and the state still fit into. */
function wallMeasure(height: number, nameChars: number, nameWidth: number): LaneMeasure {
  const byName = nameWidth / (Math.max(12, nameChars) * 0.56 + 1.6);
  const two = Math.min(height * 0.31, byName, 104);
  const one = Math.min(height * 0.62, byName, 40);
  return height > 92 ? { height, size: 'medium', typePx: two } : { height, size: 'small', typePx: one };
}

/** @param extra  px of the room that group headings and the foot take */
export function boardPlan(room: Room, lanes: readonly Lane[], wall: boolean, extra: number): BoardPlan {
  const form: LaneForm = wall ? 'wall' : room.width < room.typePx * cardBelow ? 'card' : 'desk';
  const columns = columnsOf(form, room.width, room.typePx);
  const loud = lanes.filter((lane) => lane.needsPerson).length;
  const heights = laneHeights(Math.max(0, room.height - extra), loud, lanes.length - loud, limitsFor(form, room));
  const longest = Math.max(...lanes.map((lane) => lane.card.name.length), 0);
  const measure = (height: number): LaneMeasure => {
    if (form === 'card') return { height: Math.round(room.typePx * 3), size: 'large', typePx: room.typePx };
    if (form === 'wall') return wallMeasure(height, longest, columns[0] ?? 0);
    const size = laneSizeOf(height, room.typePx * 1.25);
    return { height, size, typePx: room.typePx * (size === 'small' ? 0.93 : 1) };
  };
  return {
    form,
    columns: columns.filter((width) => width > 0).map((width) => `${Math.round(width)}px`).join(' '),
    scale: allowanceScale(Math.max(120, Math.round(columns[1] ?? 0))),
    loud: measure(heights.loud),
    calm: measure(heights.calm),
    fits: heights.fits,
  };
}
