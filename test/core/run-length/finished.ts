import type { SimulatedUnits } from '../../../core/run-length/run-tally.ts';

/** Runs a simulation to its end. */
export function finished(simulation: Generator<SimulatedUnits, SimulatedUnits, undefined>): SimulatedUnits {
  for (;;) {
    const step = simulation.next();
    if (step.done) return step.value;
  }
}
