/** How much a lane of some height can say: three lines of words, two, or one. */
export type LaneSize = 'large' | 'medium' | 'small';

export interface LaneHeights {
  /** Height of a lane that needs a person, and of one that does not; px. */
  readonly loud: number;
  readonly calm: number;
  /** Whether all lanes stand in the room, without scrolling. */
  readonly fits: boolean;
}

export interface HeightLimits {
  readonly loudLeast: number;
  readonly calmLeast: number;
  readonly loudMost: number;
  readonly calmMost: number;
  /** How many times as high as a calm lane one that needs a person should be. */
  readonly louder: number;
}

/**
 * Shares the room out: lanes grow with the trouble and with the room there is. When it gets tight the calm lanes give
 * way first, down to their least; then the loud ones, down to theirs; then the board scrolls.
 *
 * @param room  px for all lanes together
 */
export function laneHeights(room: number, loud: number, calm: number, limits: HeightLimits): LaneHeights {
  const clamp = (value: number, least: number, most: number): number => Math.min(most, Math.max(least, value));
  const even = room / Math.max(1, calm + limits.louder * loud);
  const calmWish = clamp(even, limits.calmLeast, limits.calmMost);
  const forLoud = loud === 0 ? limits.loudLeast : (room - calm * calmWish) / loud;
  const loudHeight = Math.floor(clamp(forLoud, limits.loudLeast, limits.loudMost));
  const forCalm = calm === 0 ? limits.calmLeast : (room - loud * loudHeight) / calm;
  const calmHeight = Math.floor(clamp(forCalm, limits.calmLeast, limits.calmMost));
  return { loud: loudHeight, calm: calmHeight, fits: loud * loudHeight + calm * calmHeight <= room };
}

/** @param typePx  height of one line of words, px */
export function laneSizeOf(height: number, typePx: number): LaneSize {
  if (height >= typePx * 4.1) return 'large';
  return height >= typePx * 2.9 ? 'medium' : 'small';
}
