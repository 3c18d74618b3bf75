// Bounds on measurements against the libraries they could have been taken from, accuracy and time in one
// run, as two tables in Markdown. Run after the build: node test/bench/measurement-bounds.mjs
import { readFileSync } from 'node:fs';
import tQuantile from '@stdlib/stats-base-dists-t-quantile';
import jstat from 'jstat';
import { capabilityLower } from '../../.build/core/bound/capability.js';
import { fractionBeyondUpper } from '../../.build/core/bound/fraction-beyond-limit.js';
import { tailOfConfidence } from '../../.build/core/bound/tail-of.js';
import { toleranceFactor } from '../../.build/core/bound/tolerance.js';
import { RunningMoments } from '../../.build/core/moments/running-moments.js';
import { normalQuantileOfTail, normalTail } from '../../.build/core/numerics/normal.js';
import { tQuantileOfTail } from '../../.build/core/numerics/student-t.js';

const { jStat } = jstat;
const grid = (name) => JSON.parse(readFileSync(new URL(`../reference/grid-${name}-open.json`, import.meta.url), 'utf8')).rows;
let sink = 0;

/** Median nanoseconds a call over rounds in which the contestants take turns; `most` calls a round. */
function race(contestants, most = 2000, rounds = 11) {
  const taken = Object.fromEntries(Object.keys(contestants).map((name) => [name, []]));
  for (let round = -2; round < rounds; round += 1) {
    for (const [name, call] of Object.entries(contestants)) {
      const calls = name === 'ours' ? most : Math.min(most, 200);
      const begin = process.hrtime.bigint();
      for (let i = 0; i < calls; i += 1) sink += call(0.04 + (i % 64) * 1e-3);
      if (round >= 0) taken[name].push(Number(process.hrtime.bigint() - begin) / calls);
    }
  }
  return Object.fromEntries(Object.entries(taken).map(([name, times]) => [name, times.sort((a, b) => a - b)[rounds >> 1]]));
}

function errorsOf(rows, bound) {
  const found = rows.map((row) => {
    const error = Math.abs(bound(row) / row.at(-1) - 1);
    return Number.isNaN(error) ? Infinity : error;
  }).sort((a, b) => a - b);
  return { median: found[found.length >> 1], worst: found.at(-1) };
}

/** What a user of jstat would do for the missing inverse: secant steps on its distribution function, on a normal scale. */
function noncentralityByJstat(tail, df, t) {
  const gap = (d) => jStat.normal.inv(Math.min(1 - 1e-16, Math.max(1e-300, jStat.noncentralt.cdf(t, df, d))), 0, 1) - jStat.normal.inv(1 - tail, 0, 1);
  let [before, now] = [0, 0.1].map((off) => t * (1 - 0.25 / df) - (normalQuantileOfTail(tail) + off) * Math.sqrt(1 + (t * t) / (2 * df)));
  let gapBefore = gap(before);
  for (let i = 0; i < 30; i += 1) {
    const gapNow = gap(now);
    const next = now - (gapNow * (now - before)) / (gapNow - gapBefore);
    if (!Number.isFinite(next)) return NaN;
    if (Math.abs(next - now) < 1e-9 * (1 + Math.abs(now))) return next;
    [before, gapBefore, now] = [now, gapNow, next];
  }
  return NaN;
}

const accuracy = [];
const row = (what, who, { median, worst }, rows) => accuracy.push(`| ${what} | ${who} | ${median.toExponential(0)} | ${worst.toExponential(0)} | ${rows} |`);

const t = grid('t-quantile').filter(([df]) => df !== 'inf');
row('t quantile', 'ours', errorsOf(t, ([df, c]) => tQuantileOfTail(tailOfConfidence(c), df)), t.length);
row('t quantile', 'jstat studentt.inv', errorsOf(t, ([df, c]) => jStat.studentt.inv(c, df)), t.length);
row('t quantile', '@stdlib t quantile', errorsOf(t, ([df, c]) => tQuantile(c, df)), t.length);
const normal = grid('t-quantile').filter(([df]) => df === 'inf');
row('normal quantile', 'ours', errorsOf(normal, ([, c]) => normalQuantileOfTail(tailOfConfidence(c))), normal.length);
row('normal quantile', 'jstat normal.inv', errorsOf(normal, ([, c]) => jStat.normal.inv(c, 0, 1)), normal.length);
const beyond = grid('fraction-beyond-limit');
const byJstat = ([n, k, c]) => normalTail(noncentralityByJstat(tailOfConfidence(c), n - 1, k * Math.sqrt(n)) / Math.sqrt(n));
row('fraction beyond a limit', 'ours', errorsOf(beyond, ([n, k, c]) => fractionBeyondUpper(n, k, tailOfConfidence(c))), beyond.length);
row('fraction beyond a limit', 'jstat noncentralt.cdf, solved', errorsOf(beyond, byJstat), beyond.length);
const tolerance = grid('tolerance-k');
row('tolerance factor', 'ours', errorsOf(tolerance, ([n, p, c]) => toleranceFactor(n, p, tailOfConfidence(c))), tolerance.length);
const capability = grid('capability-lower');
row('capability', 'ours', errorsOf(capability, ([n, c, , estimate]) => capabilityLower(n, estimate, tailOfConfidence(c))), capability.length);

const times = [];
const raced = (what, taken) => {
  const { ours, ...others } = taken;
  const rest = Object.entries(others).map(([name, ns]) => `${name} ${Math.round(ns)} (${(ns / ours).toFixed(1)})`).join(', ');
  times.push(`| ${what} | ${Math.round(ours)} | ${rest} |`);
};
for (const df of [4, 29, 999, 1e6]) {
  raced(`t quantile, ${df} degrees of freedom`, race({
    ours: (a) => tQuantileOfTail(a, df),
    jstat: (a) => jStat.studentt.inv(1 - a, df),
    '@stdlib': (a) => tQuantile(1 - a, df),
  }));
}
for (const [n, k] of [[2, 3], [5, 3], [10, 3], [30, 3], [30, 6], [100, 3], [1000, 3], [1e6, 3]]) {
  const contestants = { ours: (a) => fractionBeyondUpper(n, k, a) };
  if (k * Math.sqrt(n) < 37) contestants.jstat = (a) => byJstat([n, k, 1 - a]);
  raced(`fraction beyond a limit, n ${n}, k ${k}`, race(contestants, 400, 7));
}
for (const n of [2, 10, 1000]) raced(`tolerance factor 99 %, n ${n}`, race({ ours: (a) => toleranceFactor(n, 0.99, a) }, 400, 7));
const moments = new RunningMoments(1000);
for (let i = 0; i < 1000; i += 1) moments.admit(1000 + (i % 7) * 1e-3);
raced('one value in and one out of running moments', race({ ours: (a) => { moments.admit(1000 + a); moments.drop(1000 + a); return 0; } }, 20_000));

console.log('| figure | by | median error | worst | rows |\n|---|---|---|---|---|');
console.log(accuracy.join('\n'));
console.log('\n| figure | ours, ns | others, ns (times ours) |\n|---|---|---|');
console.log(times.join('\n'));
if (Number.isNaN(sink)) console.log('\nA contestant answered NaN at least once.');
