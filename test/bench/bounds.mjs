// Bounds against the libraries they could have been taken from, accuracy and time in one run, as two
// tables in Markdown. Run after the build: node test/bench/bounds.mjs
import { readFileSync } from 'node:fs';
import betaQuantile from '@stdlib/stats-base-dists-beta-quantile';
import gammaQuantile from '@stdlib/stats-base-dists-gamma-quantile';
import jstat from 'jstat';
import { demonstratedCount, demonstrationUnits, violatedCount, violationUnits } from '../../.build/core/bound/critical-count.js';
import { lotLower, lotUpper } from '../../.build/core/bound/finite-lot.js';
import { fractionBeyondUpper } from '../../.build/core/bound/fraction-beyond-limit.js';
import { jeffreysLower, jeffreysUpper } from '../../.build/core/bound/jeffreys.js';
import { midPLower, midPUpper } from '../../.build/core/bound/mid-p.js';
import { fractionLower, fractionUpper } from '../../.build/core/bound/nonconforming-fraction.js';
import { rateLower, rateUpper } from '../../.build/core/bound/rate.js';
import { tailOfConfidence } from '../../.build/core/bound/tail-of.js';
import { wilsonUpper } from '../../.build/core/bound/wilson.js';

const { jStat } = jstat;
const grid = (name) => JSON.parse(readFileSync(new URL(`../reference/grid-${name}-open.json`, import.meta.url), 'utf8')).rows;

/**
 * Best nanoseconds a call over many short rounds in which the contestants take turns: what others do
 * on the machine slows some rounds, never all.
 */
function race(contestants, rounds = 150, roundMs = 0.5) {
  const names = Object.keys(contestants);
  const taken = new Map(names.map((name) => [name, []]));
  const loops = new Map(names.map((name) => {
    timed(contestants[name], 300);
    const once = timed(contestants[name], 64) / 64;
    return [name, Math.max(1, Math.ceil((roundMs * 1e6) / once))];
  }));
  for (let round = 0; round < rounds; round += 1) {
    for (const name of names) taken.get(name).push(timed(contestants[name], loops.get(name)) / loops.get(name));
  }
  return Object.fromEntries(names.map((name) => [name, taken.get(name).sort((a, b) => a - b)[0]]));
}

let sink = 0;
function timed(of, loops) {
  const begin = process.hrtime.bigint();
  for (let i = 0; i < loops; i += 1) sink += of(0.04 + (i % 64) * 1e-3);
  return Number(process.hrtime.bigint() - begin);
}

function errors(rows, bound) {
  const found = rows.map((row) => {
    const wanted = row.at(-1);
    if (wanted === 0 || wanted === 1) return 0;
    const error = Math.abs(bound(row) / wanted - 1);
    return Number.isNaN(error) ? Infinity : error;
  }).sort((a, b) => a - b);
  return { median: found[found.length >> 1], worst: found.at(-1) };
}

const accuracy = [];
const row = (what, who, { median, worst }, rows) => accuracy.push(`| ${what} | ${who} | ${median.toExponential(0)} | ${worst.toExponential(0)} | ${rows} |`);

const binomial = grid('clopper-pearson');
const viaBeta = (inverse) => ([n, x, confidence, side]) => side === 'upper'
  ? (x === n ? 1 : inverse(confidence, x + 1, n - x))
  : (x === 0 ? 0 : inverse(tailOfConfidence(confidence), x, n - x + 1));
row('binomial', 'ours', errors(binomial, ([n, x, c, side]) => (side === 'upper' ? fractionUpper : fractionLower)(x, n, tailOfConfidence(c))), binomial.length);
row('binomial', 'jstat beta.inv', errors(binomial, viaBeta((p, a, b) => jStat.beta.inv(p, a, b))), binomial.length);
row('binomial', '@stdlib beta quantile', errors(binomial, viaBeta(betaQuantile)), binomial.length);

const poisson = grid('poisson').filter(([count]) => count <= 1e4); // jstat takes seconds beyond
const viaGamma = (inverse) => ([x, c, side]) => (side === 'upper' ? inverse(c, x + 1) : x === 0 ? 0 : inverse(tailOfConfidence(c), x));
row('Poisson', 'ours', errors(poisson, ([x, c, side]) => (side === 'upper' ? rateUpper : rateLower)(x, 1, tailOfConfidence(c))), poisson.length);
row('Poisson', 'jstat gamma.inv', errors(poisson, viaGamma((p, a) => jStat.gamma.inv(p, a, 1))), poisson.length);
row('Poisson', '@stdlib gamma quantile', errors(poisson, viaGamma((p, a) => gammaQuantile(p, a, 1))), poisson.length);

console.log('| bound | by | median rel. error | worst | rows |\n|---|---|---|---|---|');
console.log(accuracy.join('\n'));

console.log('\n| upper bound at 95 % | ours ns | jstat ns | @stdlib ns | jstat/ours | @stdlib/ours |\n|---|---|---|---|---|---|');
const line = (what, { ours, jstat: theirs, stdlib }) =>
  console.log(`| ${what} | ${ours.toFixed(0)} | ${theirs.toFixed(0)} | ${stdlib.toFixed(0)} | ${(theirs / ours).toFixed(1)} | ${(stdlib / ours).toFixed(1)} |`);
for (const [x, n] of [[1, 1000], [5, 5000], [20, 2000], [50, 10_000], [50, 1e6], [200, 1e5], [1000, 1e5], [1e4, 1e6], [1e5, 1e7], [1e6, 1e8]]) {
  line(`binomial, ${x} of ${n}`, race({
    ours: (tail) => fractionUpper(x, n, tail),
    jstat: (tail) => jStat.beta.inv(1 - tail, x + 1, n - x),
    stdlib: (tail) => betaQuantile(1 - tail, x + 1, n - x),
  }));
}
for (const x of [1, 5, 50, 1000, 1e4]) {
  line(`Poisson, ${x}`, race({
    ours: (tail) => rateUpper(x, 1, tail),
    jstat: (tail) => jStat.gamma.inv(1 - tail, x + 1, 1),
    stdlib: (tail) => gammaQuantile(1 - tail, x + 1, 1),
  }, 40));
}
const beyond = race({
  ours: (tail) => fractionBeyondUpper(30, 2.2, tail),
  jstat: (tail) => jStat.noncentralt.cdf(2.2 * Math.sqrt(30), 29, 9 + tail),
}, 40);
console.log(`| beyond a limit, n = 30 (jstat: one distribution value, of which a bound takes ten) | ${beyond.ours.toFixed(0)} | ${beyond.jstat.toFixed(0)} | | ${(beyond.jstat / beyond.ours).toFixed(1)} | |`);

/** All rows of the Poisson grid once, large counts among them: what a bound costs over the whole range. */
const everyCount = grid('poisson').filter(([count]) => count <= 1e6).map(([count, confidence, side]) => [count, confidence, side, tailOfConfidence(confidence)]);
const whole = (of) => {
  let best = Infinity;
  for (let pass = 0; pass < 20; pass += 1) {
    const begin = process.hrtime.bigint();
    for (const one of everyCount) sink += of(one);
    best = Math.min(best, Number(process.hrtime.bigint() - begin) / everyCount.length);
  }
  return best;
};
const lastly = (inverse) => ([x, c, side, tail]) => (side === 'upper' ? inverse(c, x + 1) : x === 0 ? 0 : inverse(tail, x));
const rates = {
  ours: ([x, , side, tail]) => (side === 'upper' ? rateUpper : rateLower)(x, 1, tail),
  jstat: lastly((p, a) => jStat.gamma.inv(p, a, 1)),
  stdlib: lastly((p, a) => gammaQuantile(p, a, 1)),
};
line(`Poisson, mean over ${everyCount.length} grid rows to 1e6`, Object.fromEntries(Object.entries(rates).map(([who, of]) => [who, whole(of)])));

/** The slowest argument: each is run often and counted at its best, so that a pause of the machine is none of ours. */
console.log('\n| slowest of many arguments (x to 1e6, n to 1e9, tails 1e-300 to 0.9) | µs | at |\n|---|---|---|');
const samples = [];
for (const x of [0, 1, 3, 10, 50, 200, 799, 801, 3000, 3e4, 1e6]) {
  for (const n of [x + 1, 2 * x + 3, 10 * x + 10, 1e3 * x + 1e3, 1e9].filter((size) => size <= 1e9)) {
    for (const tail of [1e-300, 1e-12, 1e-6, 1e-3, 0.05, 0.2, 0.45, 0.5, 0.55, 0.9]) samples.push([x, n, tail]);
  }
}
function slowest(name, of) {
  let worst = [0, ''];
  for (const [x, n, tail] of samples) {
    let best = Infinity;
    for (let i = 0; i < 12; i += 1) {
      const begin = process.hrtime.bigint();
      sink += of(x, n, tail);
      best = Math.min(best, Number(process.hrtime.bigint() - begin));
    }
    if (best > worst[0]) worst = [best, `${x} of ${n}, ${tail}`];
  }
  console.log(`| ${name} | ${(worst[0] / 1000).toFixed(1)} | ${worst[1]} |`);
}
const calls = {
  fractionUpper, fractionLower, midPUpper, midPLower, jeffreysUpper, jeffreysLower, wilsonUpper,
  rateUpper: (x, _n, tail) => rateUpper(x, 1, tail),
  rateLower: (x, _n, tail) => rateLower(x, 1, tail),
  lotUpper: (x, n, tail) => lotUpper({ nonconforming: x, sampled: Math.min(n, 10 * x + 50), lotSize: n }, tail),
  lotLower: (x, n, tail) => lotLower({ nonconforming: x, sampled: Math.min(n, 10 * x + 50), lotSize: n }, tail),
  demonstratedCount: (x, n, tail) => demonstratedCount(n, (x + 0.5) / (n + 1), tail),
  violatedCount: (x, n, tail) => violatedCount(n, (x + 0.5) / (n + 1), tail),
  demonstrationUnits: (x, n, tail) => demonstrationUnits(x, (x + 0.5) / (n + 1), tail),
  violationUnits: (x, n, tail) => violationUnits(x, (x + 0.5) / (n + 1), tail),
};
for (const [name, of] of Object.entries(calls)) {
  for (let warm = 0; warm < 3; warm += 1) for (const [x, n, tail] of samples) sink += of(x, n, tail);
  slowest(name, of);
}
if (Number.isNaN(sink)) console.log('a bound was NaN');
