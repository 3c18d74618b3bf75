import type { Quantity, RuleKind } from '../plant/guarantee.ts';

/** One sentence that says why an alarm was raised, for a person who sees nothing else; figures stand beside it. */
export function groundsSentence(rule: RuleKind, quantity: Quantity, side: 'at-most' | 'at-least', figures: Readonly<Record<string, number>>): string {
  const seen = evidenceInWords(figures);
  const bound = side === 'at-most' ? 'upper' : 'lower';
  const opposite = side === 'at-most' ? 'lower' : 'upper';
  switch (rule) {
    case 'crossing':
      return `The ${bound} bound has crossed the guarantee line: ${seen}. The guarantee is no longer demonstrated; that is not yet proof of a bad line.`;
    case 'violation':
      return `The ${opposite} bound is beyond the guarantee line as well: ${seen}. The evidence says the guarantee does not hold.`;
    case 'deterioration':
      return `The change detector says the ${quantity === 'mean' ? 'mean' : 'rate'} has become worse: ${seen}.`;
    case 'silence':
      return `No record has come for ${inMinutes(figures['silentMs'] ?? 0)} although the line is said to run.`;
    case 'bad-data':
      return `More than ${figures['moreThan'] ?? 0} records within ${inMinutes(figures['withinMs'] ?? 0)} were refused, contradictory, implausibly timed or lost.`;
  }
}

function evidenceInWords(figures: Readonly<Record<string, number>>): string {
  const { inspected, nonconforming, events, count, exposure, mean, values, seen, found, runUnits, runNonconforming, lots, lotsOver } = figures;
  if (lots !== undefined && lotsOver !== undefined) return `${lotsOver} of ${lots} lots held more nonconforming units than allowed`;
  if (seen !== undefined) return found === undefined ? `${seen} values since it last began` : `${found} found in ${Number(seen.toPrecision(9))} inspected since it last began`;
  if (runUnits !== undefined && runNonconforming !== undefined) return `${runNonconforming} nonconforming of ${runUnits} units since the run began`;
  if (inspected !== undefined && nonconforming !== undefined) {
    return `${nonconforming} nonconforming of ${inspected} units in the window${events === undefined ? '' : `, in ${events} events`}`;
  }
  if (count !== undefined && exposure !== undefined) return `${count} nonconformities in an exposure of ${Number(exposure.toPrecision(6))} in the window`;
  if (mean !== undefined && values !== undefined) return `mean ${Number(mean.toPrecision(6))} of ${values} values in the window`;
  return 'see the figures';
}

function inMinutes(ms: number): string {
  const minutes = ms / 60_000;
  return minutes >= 1 ? `${Number(minutes.toPrecision(3))} min` : `${Number((ms / 1000).toPrecision(3))} s`;
}
