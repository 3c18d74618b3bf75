import { describe, expect, it } from 'vitest';
import { binomialChances } from '../../../core/run-length/binomial-chances.ts';
import { betaPriorAt, logEvidenceDemonstrated, logEvidenceViolated } from '../../../core/sequential/nonconforming-evidence.ts';
import { integral } from './simulated-paths.ts';

/* From 450-digit arithmetic (mpmath 1.3: positive series of the lower kernel, beta function for the rest), at the very
 * doubles of line and prior: nonconforming, units, line, a, b, ln evidence demonstrated, violated. */
const exact: readonly (readonly [number, number, number, number, number, string, string])[] = [
  [0, 3528, 4.575015893819907e-06, 1.7, 0.5, '0.00598625309354070742', '-14.346689340893153759'],
  [19, 5188736, 4.174934284603922e-06, 1.7, 0.5, '-0.5327153511654473534', '-22.950614366688631990'],
  [129, 581924929, 7.237116310716597e-07, 1, 0.5, '136.823909407348445606', '-20.510768794322438967'],
  [0, 3716, 8.75241367571824e-06, 0.3, 0.5, '0.02505922762892865869', '-3.3351684371933198875'],
  [0, 1152, 2.6509902895847906e-07, 2, 0.5, '0.00010180063585662129', '-14.387621577518780563'],
  [1, 2141458, 3.967132894941638e-07, 1.7, 4285208.916885597, '-0.3448091681699771521', '-0.1102187070034741212'],
  [1962, 76170427, 2.6100979836542968e-05, 0.5, 19155.8689612897, '-4.0599221341687927028', '-4.2579130604453260012'],
  [0, 12, 0.008964277235463964, 1, 110.55389037320899, '0.06330941706960403767', '-0.1030477569036098770'],
  [284, 28668411, 1.0344906158639808e-05, 0.5, 48332.46622825452, '-2.9288012342057581618', '-3.3975803490245851101'],
  [122, 3088073, 0.00013425161244222866, 1, 0.5, '140.651456064594343420', '-15.289086626191466102'],
  [0, 1586, 0.003002298020128637, 0.3, 99.62345796076106, '4.23874188081116204150', '-2.1976752828849267430'],
  [0, 4, 0.031025999490427676, 2, 62.462065134019355, '0.05783307642025946108', '-0.0818211348357658312'],
  [1339, 22335, 0.02937795900766246, 1.7, 56.16651140593531, '-6.7297565919293588555', '280.064423834996778749'],
  [1, 26, 0.011000681619088524, 2, 0.5, '-0.3342366556804062536', '-4.6415354991888486919'],
  [0, 6, 0.038726930374166066, 2, 49.64364902347537, '0.10950043762492852222', '-0.1495594736695289929'],
  [1201, 663636518, 8.842775987359555e-07, 0.3, 0.5, '-7.6262647574853795066', '237.848624426398476984'],
  [4253, 609046701, 3.581431567655637e-06, 0.5, 139608.47773827746, '-8.6738758928218094913', '764.414878007800144855'],
];

describe('evidence on a nonconforming fraction', () => {
  it.each(exact.map((row) => ({ row })))('is as in 450 digits: $row', ({ row: [x, n, line, a, b, demonstrated, violated] }) => {
    const prior = { a, b };
    expect(Math.abs(logEvidenceDemonstrated(x, n, line, prior) - Number(demonstrated))).toBeLessThan(3e-14 * (1 + Math.abs(Number(demonstrated))));
    expect(Math.abs(logEvidenceViolated(x, n, line, prior) - Number(violated))).toBeLessThan(3e-14 * (1 + Math.abs(Number(violated))));
  });

  it('equals the likelihood ratio averaged over the prior on its side of the line', () => {
    const line = 0.2;
    const prior = { a: 2, b: 3 };
    const density = (p: number): number => p ** (prior.a - 1) * (1 - p) ** (prior.b - 1);
    const ratio = (p: number, x: number, n: number): number => (p / line) ** x * ((1 - p) / (1 - line)) ** (n - x);
    for (const [x, n] of [[0, 0], [0, 7], [3, 12], [12, 12], [1, 30]] as const) {
      const below = integral((p) => density(p) * ratio(p, x, n), 0, line) / integral(density, 0, line);
      const above = integral((p) => density(p) * ratio(p, x, n), line, 1) / integral(density, line, 1);
      expect(logEvidenceDemonstrated(x, n, line, prior)).toBeCloseTo(Math.log(below), 9);
      expect(logEvidenceViolated(x, n, line, prior)).toBeCloseTo(Math.log(above), 9);
    }
  });

  it.each([0.3, 0.001, 0.9])('is expected to be exactly 1 on the line %d, and no more on the wrong side of it', (line) => {
    for (const n of [1, 5, 40]) {
      const expected = (rate: number, log: typeof logEvidenceViolated): number =>
        binomialChances(n, rate, n).exactly.reduce((sum, chance, x) => sum + chance * Math.exp(log(x, n, line, betaPriorAt(line))), 0);
      expect(expected(line, logEvidenceDemonstrated)).toBeCloseTo(1, 12);
      expect(expected(line, logEvidenceViolated)).toBeCloseTo(1, 12);
      expect(expected((1 + line) / 2, logEvidenceDemonstrated)).toBeLessThan(1);
      expect(expected(line / 2, logEvidenceViolated)).toBeLessThan(1);
    }
  });

  it('rises with a conforming unit and falls with a nonconforming one', () => {
    const prior = betaPriorAt(0.001);
    for (const [x, n] of [[0, 1], [3, 5000], [12, 9000]] as const) {
      const now = logEvidenceDemonstrated(x, n, 0.001, prior);
      expect(logEvidenceDemonstrated(x, n + 1, 0.001, prior)).toBeGreaterThan(now);
      expect(logEvidenceDemonstrated(x + 1, n + 1, 0.001, prior)).toBeLessThan(now);
      expect(logEvidenceViolated(x + 1, n + 1, 0.001, prior)).toBeGreaterThan(logEvidenceViolated(x, n, 0.001, prior));
    }
  });

  it('has its prior centred on the line', () => {
    const { a, b } = betaPriorAt(0.001, 2);
    expect(a / (a + b)).toBeCloseTo(0.001, 15);
    expect(a).toBe(2);
  });

  it('names what is out of range', () => {
    const prior = betaPriorAt(0.001);
    expect(() => logEvidenceDemonstrated(3, 2, 0.001, prior)).toThrow('nonconforming is 3, expected at most the 2 units');
    expect(() => logEvidenceDemonstrated(1.5, 2, 0.001, prior)).toThrow('nonconforming');
    expect(() => logEvidenceViolated(1, NaN, 0.001, prior)).toThrow('units');
    expect(() => logEvidenceViolated(1, 2, 0, prior)).toThrow('line');
    expect(() => logEvidenceViolated(1, 2, 0.5, { a: 0, b: 1 })).toThrow('prior a');
    expect(() => betaPriorAt(1)).toThrow('line');
    expect(() => betaPriorAt(0.5, Infinity)).toThrow('weight');
  });
});
