/** The plant clock as last told: `at` (ms since 1970) was true at `heardAt` (ms of this browser's steady clock). */
export interface PlantClock {
  readonly at: number;
  readonly heardAt: number;
  /** Plant milliseconds in one millisecond of the wall clock; 1 but in the demo. */
  readonly rate: number;
}

/** The plant's time at `now` of this browser's steady clock: ages tick with it, also while nothing is heard. */
export const plantTime = (clock: PlantClock, now: number): number => clock.at + (now - clock.heardAt) * clock.rate;
