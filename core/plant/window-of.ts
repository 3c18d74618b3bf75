import { demonstrationUnits } from '../bound/critical-count.ts';
import type { SpanMs, Tail } from '../units.ts';
import type { Complain } from './complain.ts';
import { mostWindowUnits } from './figure-schemas.ts';
import type { WindowRule } from './guarantee.ts';
import type { WindowFile } from './guarantee-schema.ts';
import type { PromiseReading } from './promise-reading.ts';
import { windowProposal } from './window-proposal.ts';

/** Most steps of a window of time; each holds its own sums. */
const mostSteps = 3600;

/** Reads the window, or proposes one from the normal rate; complains of one that could never demonstrate the promise. */
export function windowOf(file: WindowFile | undefined, reading: PromiseReading, tail: Tail, complain: Complain): WindowRule | undefined {
  const { promise, counted } = reading;
  if (promise.quantity === 'lot-fraction') {
    return file === undefined || file === 'lot' ? { kind: 'lot' } : void complain(['window'], 'lot, or no window: a lot fraction is about one lot');
  }
  if (file === undefined) return proposed(reading, tail, complain);
  if (typeof file === 'string') return { kind: file };
  if ('time' in file) return timeWindow(file.time, file.step, complain);
  if (counted !== undefined && counted.line < lowestLine) {
    return void complain(['window', 'units'], `a guarantee line of ${lowestLine} or more: no window could demonstrate less`);
  }
  const fewest = counted === undefined ? 1 : demonstrationUnits(0, counted.line, tail);
  if (file.units >= fewest) return { kind: 'units', units: file.units };
  return void complain(['window', 'units'], `at least ${fewest} units, the fewest that can demonstrate the guarantee even when all conform`);
}

/** Below this nonconforming fraction no window of the largest size is enough at any usual confidence level. */
const lowestLine = 1e-9;

function proposed({ promise, counted }: PromiseReading, tail: Tail, complain: Complain): WindowRule | undefined {
  const forms = 'a window: units: 20000, time: 8 h, lot, shift or run';
  if (counted === undefined || promise.quantity === 'chained-yield') return void complain(['window'], forms);
  const { line, well } = counted;
  if (well === undefined) return void complain(['window'], `${forms}; or a normal-rate from which one is proposed`);
  const units = line < lowestLine ? undefined : windowProposal(line, well, tail, mostWindowUnits);
  if (units !== undefined) return { kind: 'units', units };
  return void complain(['normal-rate'], 'a normal rate farther from the guarantee line; a well line could not stay demonstrated in any window');
}

function timeWindow(spanMs: SpanMs, step: SpanMs | undefined, complain: Complain): WindowRule | undefined {
  const stepMs = step ?? stepOf(spanMs);
  if (stepMs !== undefined && spanMs % stepMs === 0 && spanMs / stepMs <= mostSteps) return { kind: 'time', spanMs, stepMs };
  return void complain(['window', 'step'], `a step that divides the window's time into at most ${mostSteps} equal parts`);
}

/** A sixtieth, or the next smaller part that is whole milliseconds. */
function stepOf(spanMs: number): SpanMs | undefined {
  for (let parts = 60; parts <= mostSteps; parts += 1) if (spanMs % parts === 0) return (spanMs / parts) as SpanMs;
  return undefined;
}
