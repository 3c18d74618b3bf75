// How late each rule calls at one rate of false calls: the key table of the project's statistical specification (section
// 4.3), computed anew and printed as markdown beside the figures given there. Build first: npx tsc -p server.
// usage: node test/bench/delay-table.mjs [changes simulated a figure, 20000]
import { cusumDelay, cusumPlan } from '../../.build/core/run-length/cusum-run-length.js';
import { seededUniform } from '../../.build/core/run-length/seeded-uniform.js';
import { simulateDelay, simulateRunLength } from '../../.build/core/run-length/simulated-run-length.js';
import { detectorWatch, windowWatch } from '../../.build/core/run-length/watch.js';
import { windowRunLength } from '../../.build/core/run-length/window-run-length.js';
import { fractionDetector } from '../../.build/core/sequential/detector-tuning.js';

const baseline = 1e-3;
const runs = Number(process.argv[2] ?? 20_000);
/** Fraction before and after the change, in multiples of the baseline. */
const changes = [[1, 2], [1, 5], [1, 10], [0.5, 2], [0.5, 5], [0.5, 10]];
/** Standard error of a figure of the specification: below 1 %, but for the small windows. */
const givenError = (units) => (units <= 2000 ? 0.025 : 0.01);

/** Run length wanted, then [scheme, its size, what the specification gives for the six changes]. */
const table = [
  [1e6, [
    ['window', 1000, [39_611, 1893, 614, 39_881, 1932, 640]],
    ['window', 2000, [24_106, 1748, 734, 24_518, 1834, 811]],
    ['window', 5000, [14_490, 2150, 970, 15_078, 2491, 1182]],
    ['window', 10_000, [12_170, 2684, 1207, 13_264, 3525, 1673]],
    ['window', 20_000, [13_004, 3374, 1519, 16_014, 5240, 2488]],
    ['window', 50_000, [17_178, 4515, 2025, 28_304, 9483, 4502]],
    ['CUSUM', 2, [11_351, 2002, 848, 12_265, 2213, 934]],
    ['CUSUM', 3, [13_869, 1713, 684, 14_371, 1811, 727]],
    ['CUSUM', 5, [22_348, 1638, 589, 22_658, 1680, 610]],
    ['one ratio 2, threshold', 7.8e5, [11_167, 2095, 890, 12_589, 2459, 1061], [2]],
    ['one ratio 5, threshold', 5.9e5, [20_246, 1615, 598, 20_624, 1695, 632], [5]],
    ['mixture, threshold', 6.5e5, [12_184, 1740, 610, 13_676, 1875, 643], undefined],
    ['mixture, threshold', 1e6, [13_372, 1846, 643, 14_930, 1994, 675], undefined],
  ]],
  [1e7, [
    ['window', 5000, [33_976, 2707, 1218, 34_405, 3010, 1426]],
    ['window', 10_000, [21_451, 3452, 1549, 22_270, 4211, 1996]],
    ['window', 20_000, [18_601, 4430, 1983, 20_640, 6192, 2945]],
    ['window', 50_000, [24_121, 6222, 2778, 33_165, 11_113, 5263]],
    ['CUSUM', 2, [17_090, 2922, 1224, 18_161, 3144, 1325]],
    ['CUSUM', 5, [50_650, 2194, 783, 50_846, 2242, 806]],
    ['mixture, threshold', 6.5e6, [18_522, 2392, 794, 20_192, 2474, 819], undefined],
    ['mixture, threshold', 1e7, [19_779, 2511, 824, 21_393, 2598, 851], undefined],
  ]],
];

function finished(simulation) {
  for (;;) {
    const step = simulation.next();
    if (step.done) return step.value;
  }
}

let seed = 100;
const simulated = (watch, [before, after]) => {
  const { units, standardError } = finished(simulateDelay({ watch, runs, uniform: seededUniform((seed += 1)) }, before * baseline, after * baseline));
  return { units, error: standardError };
};

/** Counts are whole, so the two that straddle the wanted run length are weighed by its logarithm. */
function windowDelays(units, wanted) {
  let count = Math.ceil(units * baseline) + 1;
  const length = (at) => Math.log(windowRunLength({ units, count: at }, baseline).units);
  while (length(count) < Math.log(wanted)) count += 1;
  const share = (Math.log(wanted) - length(count - 1)) / (length(count) - length(count - 1));
  return changes.map((change) => {
    const low = simulated(windowWatch({ units, count: count - 1 }), change);
    const high = simulated(windowWatch({ units, count }), change);
    return { units: low.units + share * (high.units - low.units), error: Math.max(low.error, high.error) };
  });
}

function delaysOf([scheme, size, , ratios], wanted) {
  if (scheme === 'window') return windowDelays(size, wanted);
  if (scheme === 'CUSUM') {
    const plan = cusumPlan(baseline, size, wanted);
    return changes.map(([before, after]) => ({ units: cusumDelay(plan, before * baseline, after * baseline), error: 0 }));
  }
  const watch = detectorWatch(fractionDetector(baseline, size, ratios));
  return changes.map((change) => simulated(watch, change));
}

let beyond = 0;
let figures = 0;
const cell = ({ units, error }, given, small) => {
  figures += 1;
  const off = (units - given) / Math.hypot(error, givenError(small) * given);
  if (Math.abs(off) > 3) beyond += 1;
  const wide = error > 0 ? ` ± ${Math.round(error)}` : ' exact';
  return `${Math.round(units)}${wide} (${given}${Math.abs(off) > 3 ? ' !' : ''})`;
};

console.log(`Mean units from a change to the call, fraction ${baseline} before it (or half of it); in brackets the specification.`);
for (const [wanted, schemes] of table) {
  console.log(`\n**${wanted.toExponential(0)} units between false calls**\n`);
  console.log('| rule | to 2x | to 5x | to 10x | from half to 2x | to 5x | to 10x |');
  console.log('|---|---|---|---|---|---|---|');
  for (const scheme of schemes) {
    const small = scheme[0] === 'window' ? scheme[1] : Infinity;
    const cells = delaysOf(scheme, wanted).map((delay, k) => cell(delay, scheme[2][k], small));
    console.log(`| ${scheme[0]} ${scheme[1]} | ${cells.join(' | ')} |`);
  }
}
const guaranteed = finished(simulateRunLength({ watch: detectorWatch(fractionDetector(baseline, 1e6)), runs: Math.ceil(runs / 10), uniform: seededUniform(99) }, baseline));
console.log(`\nThe mixture with threshold 1e6 calls falsely every ${guaranteed.units.toExponential(3)} ± ${guaranteed.standardError.toExponential(1)} units (1.57e6).`);
console.log(`${figures - beyond} of ${figures} figures within three standard errors of the specification.`);
process.exitCode = beyond > 2 ? 1 : 0;
