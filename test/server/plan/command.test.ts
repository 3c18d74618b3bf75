import { describe, expect, it } from 'vitest';
import { fractionPlan } from '../../../core/plan/demonstration.ts';
import type { Tail } from '../../../core/units.ts';
import { startVouchline, vouchline } from '../built-program.ts';

const plan = (...args: readonly string[]) => vouchline(['plan', ...args]);
const inJson = (...args: readonly string[]): Record<string, unknown> => JSON.parse(plan(...args, '--json').out) as Record<string, unknown>;
const confidence = ['--confidence', '95 %'] as const;

describe('vouchline plan, demonstrations', () => {
  it('gives the smallest number of units, the chance of passing, a plot and the rule of three', () => {
    const { code, out, err } = plan('fraction', '--line', '200 ppm', ...confidence, '--rate', '50 ppm');
    expect({ code, err }).toEqual({ code: 0, err: '' });
    expect(out).toContain('14 978 units; nonconforming units with which it passes: none.');
    expect(out).toMatch(/^at most 1 +23 718 +66\.8 %$/m);
    expect(out).toMatch(/^Check +Rule of three for 14 978 faultless units: 3\/n = 200\.3 ppm; exact 200 ppm\.$/m);
    expect(out).toContain('┊ is the guarantee line');
    expect(out).toMatch(/^Looks +Valid at one look fixed in advance/m);
  });

  it('in JSON, the same figures as core', () => {
    const { size, plans } = inJson('fraction', '--line', '0.1 %', ...confidence, '--allowed', '6') as { size: number; plans: { allowed: number; size: number }[] };
    expect(size).toBe(fractionPlan(0.001, 6, 0.05 as Tail).size);
    expect(plans.map(({ allowed }) => allowed)).toEqual([0, 1, 2, 3, 6]);
  });

  it.each([
    // A yield is a nonconforming fraction told from the other side: 0.985^199 < 0.05 <= 0.985^198.
    [['yield', '--line', '98.5 %', ...confidence], 199],
    // -ln(0.01) / 0.02 m.
    [['rate', '--line', '2 per 100 m', '--confidence', '99 %'], 230.2585],
    // All but 5 of 500: (334 over 6 chosen of 500) falls below 0.1 at 159.
    [['lot', '--lot-size', '500', '--line', '1 %', '--confidence', '90 %'], 159],
  ])('%j', (args, size) => {
    expect(Number(inJson(...args)['size'])).toBeCloseTo(size, 4);
  });

  it('of a mean: measurements for a wanted chance, where the process runs as supposed', () => {
    const asked = ['mean', '--line', '1000', '--side', 'at-least', '--mean', '1002', '--sigma', '3', ...confidence, '--sigma-known'];
    // Known sigma: n = ((z(0.05) + z(0.1)) * 3 / 2)^2 = 19.27, so 20.
    expect(inJson(...asked)['n']).toBe(20);
    expect(plan(...asked, '--unit', 'ml').out).toContain('runs at 1002 ml ± 3 ml: 20 measurements.');
  });
});

describe('vouchline plan, windows', () => {
  it('proposes the window of a normal rate, and says what a window does', () => {
    const forward = inJson('window', '--line', '200 ppm', '--normal-rate', '50 ppm', ...confidence) as { proposed: number; steady: number };
    expect(forward.steady).toBeGreaterThanOrEqual(forward.proposed);
    const back = inJson('window', '--line', '200 ppm', '--units', String(forward.proposed), ...confidence) as { highestNormalRate: number };
    expect(back.highestNormalRate).toBeGreaterThanOrEqual(50e-6);
    const less = inJson('window', '--line', '200 ppm', '--units', String(forward.proposed - 1), ...confidence) as { highestNormalRate: number };
    expect(less.highestNormalRate).toBeLessThan(50e-6);
  });

  it('of a rate, as exposure: forward and back', () => {
    const forward = inJson('window', '--line', '2 per 100 m', '--normal-rate', '0.5 per 100 m', ...confidence) as { proposed: number; steady: number; unit: string };
    expect(forward).toMatchObject({ unit: 'm' });
    expect(forward.steady).toBeGreaterThanOrEqual(forward.proposed);
    const back = inJson('window', '--line', '2 per 100 m', '--exposure', `${forward.steady} m`, ...confidence) as { highestNormalRate: number };
    expect(back.highestNormalRate).toBeGreaterThanOrEqual(0.005);
    expect(plan('window', '--line', '2 per 100 m', '--exposure', '1500', ...confidence).out).toContain('In 1500 m up to 20 nonconformities demonstrate at most 2 per 100 m at 95 %');
    expect(plan('window', '--line', '2 per 100 m', '--exposure', '100 m', ...confidence).out).toContain('Not even 100 m without a nonconformity demonstrate 2 per 100 m');
  });

  it('of a mean, in measurements: forward and back', () => {
    const asked = ['window', '--side', 'at-least', '--line', '1000', '--sigma', '3', ...confidence];
    const { units } = inJson(...asked, '--mean', '1002') as { units: number };
    expect((inJson(...asked, '--units', String(units)) as { nearestNormalMean: number }).nearestNormalMean).toBeLessThanOrEqual(1002);
    expect((inJson(...asked, '--units', String(units - 1)) as { nearestNormalMean: number }).nearestNormalMean).toBeGreaterThan(1002);
    expect(plan(...asked, '--mean', '1002', '--unit', 'ml').out).toContain('keeps a line at its normal mean of 1002 ml demonstrated 99.0 % of the time.');
  });

  it('says that a window is too small', () => {
    expect(plan('window', '--line', '200 ppm', '--units', '100', ...confidence).out).toContain('Not even 100 units without a nonconforming one demonstrate 200 ppm');
  });
});

describe('vouchline plan, alarm settings', () => {
  const scene = ['--line', '0.1 %', '--per-day', '20000'] as const;

  it('of a window rule: the count of its confidence, false calls a month, delays', () => {
    const answer = inJson('alarm', '--rule', 'window', ...scene, '--units', '10000', ...confidence, '--worse', '0.5 %') as {
      count: number;
      betweenFalseCalls: { units: number };
      falseCallsPerMonth: number;
      delays: { units: number; standardError: number; days: number }[];
    };
    expect(answer.count).toBe(16);
    // Simulated by others for this very rule: 66 450, standard error 950.
    expect(Math.abs(answer.betweenFalseCalls.units - 66_450)).toBeLessThan(1900);
    expect(answer.falseCallsPerMonth).toBeCloseTo((30 * 20_000) / answer.betweenFalseCalls.units, 9);
    const [delay] = answer.delays;
    expect(delay!.standardError).toBeLessThan(0.02 * delay!.units);
    expect(delay!.days).toBe(delay!.units / 20_000);
  });

  it('of a CUSUM: computed, with at least the wanted units between false calls', () => {
    const answer = inJson('alarm', '--rule', 'cusum', ...scene, '--between', '1000000') as { betweenFalseCalls: { units: number }; delays: { units: number; standardError?: number }[] };
    expect(answer.betweenFalseCalls.units).toBeGreaterThanOrEqual(1_000_000);
    const delays = answer.delays.map(({ units }) => units);
    expect(delays).toEqual([...delays].sort((a, b) => b - a));
    expect(answer.delays.every(({ standardError }) => standardError === undefined)).toBe(true);
  });

  it('of a detector: guaranteed below its baseline, simulated on it, the same every time', () => {
    const asked = ['alarm', '--rule', 'detector', ...scene, '--between', '50000', '--worse', '0.5 %'];
    const first = inJson(...asked);
    expect(first).toEqual(inJson(...asked));
    expect((first['betweenFalseCalls'] as { units: number }).units).toBeGreaterThan(50_000);
    expect(inJson(...asked, '--normal-rate', '0.02 %')['betweenFalseCalls']).toEqual({ units: 50_000, standing: 'at least' });
  });

  it('of a rate: the same as of a fraction so small that units become exposure', () => {
    type Answer = { count?: number; betweenFalseCalls: { units: number }; delays: { units: number }[] };
    const rate = (rule: string, ...more: readonly string[]) => inJson('alarm', '--rule', rule, '--line', '1 per 1000 m', ...more) as Answer;
    const fraction = (rule: string, ...more: readonly string[]) => inJson('alarm', '--rule', rule, '--line', '0.0000001', ...more) as Answer;
    const window = rate('window', '--exposure', '10000 m', ...confidence);
    const units = fraction('window', '--units', '100000000', ...confidence);
    expect(window.count).toBe(units.count);
    expect(window.betweenFalseCalls.units / (units.betweenFalseCalls.units / 1e4)).toBeCloseTo(1, 9);
    const cusum = rate('cusum', '--between', '1000000');
    expect(cusum.betweenFalseCalls.units / (fraction('cusum', '--between', '1e10').betweenFalseCalls.units / 1e4)).toBeCloseTo(1, 6);
    const detector = rate('detector', '--between', '50000', '--worse', '5 per 1000 m', '--normal-rate', '0.5 per 1000 m');
    expect(detector.betweenFalseCalls).toEqual({ units: 50_000, standing: 'at least' });
    expect(detector.delays[0]!.units).toBeGreaterThan(200);
    expect(detector.delays[0]!.units).toBeLessThan(5000);
  });

  it('of a rate watched by a CUSUM: what a plain simulation of it comes to', () => {
    const answer = inJson('alarm', '--rule', 'cusum', '--line', '2 per 100 m', '--between', '20000') as { up: number; down: number; threshold: number; betweenFalseCalls: { units: number } };
    let seed = 1;
    const uniform = (): number => ((seed = (seed * 48_271) % 2_147_483_647) / 2_147_483_647); // S. K. Park, K. W. Miller 1988 (from memory)
    const runs = 1500;
    let metres = 0;
    for (let run = 0; run < runs; run += 1) {
      for (let sum = 0; sum < answer.threshold; ) {
        const gap = -Math.log(uniform()) / 0.02;
        metres += gap;
        sum = Math.max(0, sum - gap * answer.down) + answer.up;
      }
    }
    // The run length is nearly exponential: its standard error is 1 / sqrt(runs) of it; 4 of these.
    expect(Math.abs(metres / runs / answer.betweenFalseCalls.units - 1)).toBeLessThan(4 / Math.sqrt(runs));
  });

  it('of a mean: guaranteed between false calls, simulated to the call', () => {
    const asked = ['alarm', '--rule', 'detector', '--side', 'at-least', '--line', '1000', '--sigma', '3', '--mean', '1002', '--between', '100000', '--per-day', '20000'];
    const answer = inJson(...asked) as { betweenFalseCalls: object; falseCallsPerMonth: number; delays: { mean: number; units: number }[] };
    expect(answer.betweenFalseCalls).toEqual({ units: 100_000, standing: 'at least' });
    expect(answer.falseCallsPerMonth).toBeCloseTo(6, 12);
    expect(answer.delays.map(({ mean }) => mean)).toEqual([998.5, 997, 994, 991]);
    expect(answer.delays[0]!.units).toBeGreaterThan(answer.delays[3]!.units);
    expect(plan(...asked, '--range', '900..1100').out).toContain('by measurements from 900 to 1100');
  });

  it('reports progress on standard error while it takes its time, and Ctrl-C cancels it', async () => {
    const endless = ['plan', 'alarm', '--rule', 'detector', '--line', '0.1 %', '--between', '1e11', '--worse', '0.2 %'];
    let asked = false;
    const { code, out, err } = await startVouchline(endless, (said, stop) => {
      if (!asked && said.includes('simulating')) stop('SIGINT');
      asked ||= said.includes('simulating');
    });
    expect(err).toMatch(/^simulating: \d+ % \(Ctrl-C cancels\)$/m);
    expect(err).toMatch(/Cancelled\.\n$/);
    expect({ code, out }).toEqual({ code: 130, out: '' });
  });
});

describe('vouchline plan, the budget of false calls', () => {
  it('spreads it: thresholds that add up to it', () => {
    const { streams, falseCallsAtMost } = inJson('budget', '--false-calls', '0.5', '--stream', 'leak-A=9600', '--stream', 'final=19000*2') as {
      streams: { threshold: number; falseCallsPerShift: number }[];
      falseCallsAtMost: number;
    };
    // By size: (9600 + 2 * 19000) / 0.5 units between false calls for weight 1, half of it for weight 2.
    expect(streams.map(({ threshold }) => threshold)).toEqual([95_200, 47_600]);
    expect(falseCallsAtMost).toBeCloseTo(0.5, 12);
  });

  it('may give every guarantee the same part', () => {
    const { streams } = inJson('budget', '--false-calls', '0.5', '--stream', 'leak=9600', '--stream', 'surface=20', '--sharing', 'by-stream') as { streams: { falseCallsPerShift: number }[] };
    expect(streams.map((stream) => stream.falseCallsPerShift)).toEqual([0.25, 0.25]);
  });
});

describe('vouchline plan names the option, what it held and what was expected', () => {
  it.each([
    [['fraction', ...confidence], '--line is missing; expected a share of units'],
    [['fraction', '--line', '200 ppm'], '--confidence is missing'],
    [['fraction', '--line', '0', ...confidence], '--line is 0, expected a number above 0 and below 1'],
    [['fraction', '--line', '200 ppm', ...confidence, '--allowed', '-1'], '--allowed: "-1"; expected a whole number, from 0 to 1000000'],
    [['rate', '--line', '0.02', ...confidence], '--line: "0.02"; expected an amount over an exposure'],
    [['rate', '--line', '2 per 100 m', ...confidence, '--rate', '1 per h'], '--rate: "1 per h"; expected a rate per m'],
    [['lot', '--lot-size', '500', '--line', '1 %', ...confidence, '--allowed', '7'], '--allowed is 7, expected a whole number, from 0 to 5'],
    [['mean', '--line', '1000', '--side', 'at-least', '--mean', '998', '--sigma', '3', ...confidence], '--mean is 998, expected a mean on the good side of 1000'],
    [['window', '--line', '200 ppm', ...confidence], '--units is missing'],
    [['window', '--line', '200 ppm', '--normal-rate', '300 ppm', ...confidence], '--normal-rate is 0.0003, expected 0 to below the line'],
    [['window', '--line', '2 per 100 m', ...confidence], '--exposure is missing; expected a window in m, or --normal-rate'],
    [['window', '--line', '2 per 100 m', '--exposure', '5 h', ...confidence], '--exposure: "5 h"; expected an exposure above 0 in m'],
    [['window', '--line', '2 per 100 m', '--normal-rate', '1 per h', ...confidence], '--normal-rate: "1 per h"; expected a rate per m'],
    [['window', '--line', '2 per 100 m', '--normal-rate', '3 per 100 m', ...confidence], '--normal-rate is 0.03, expected 0 to below the line'],
    [['window', '--side', 'at-least', '--line', '1000', '--sigma', '3', ...confidence], '--units is missing; expected a window in measurements, or --mean'],
    [['window', '--side', 'at-least', '--line', '1000', '--sigma', '3', '--mean', '999', ...confidence], '--mean is 999, expected a mean on the good side'],
    [['window', '--side', 'at-least', '--line', '1000', '--sigma', '3', '--mean', '1001', '--units', '5', ...confidence], '--mean and --units: give one'],
    [['alarm', '--rule', 'window', '--line', '2 per 100 m', ...confidence], '--exposure is missing'],
    [['alarm', '--rule', 'detector', '--line', '0 per 100 m', '--between', '5'], '--line: "0 per 100 m"; expected an amount above 0'],
    [['alarm', '--rule', 'detector', '--line', '2 per 100 m', '--between', '5000', '--worse', '0 per m'], '--worse: "0 per m"; expected a rate above 0'],
    [['alarm', '--rule', 'detector', '--line', '2 per 100 m', '--between', '5000', '--worse', '1 per 100 m'], '--worse: "1 per 100 m"; expected a rate above the normal rate 2 per 100 m'],
    [['alarm', '--rule', 'cusum', '--side', 'at-least', '--line', '1000', '--sigma', '3', '--between', '5000'], '--rule: "cusum"; expected detector'],
    [['alarm', '--rule', 'detector', '--side', 'at-least', '--line', '1000', '--between', '5000'], '--sigma is missing'],
    [['alarm', '--rule', 'detector', '--side', 'at-least', '--line', '1000', '--sigma', '0', '--between', '5000'], '--sigma is 0, expected'],
    [['alarm', '--rule', 'detector', '--side', 'at-least', '--line', '1000', '--sigma', '3', '--between', '5000', '--worse', '1001'], '--worse: "1001"; expected a mean below the normal mean 1000'],
    [['alarm', '--rule', 'detector', '--side', 'at-least', '--line', '1000', '--sigma', '3', '--between', '5000', '--range', '5'], '--range: "5"; expected two numbers'],
    [['alarm', '--line', '0.1 %'], '--rule is missing'],
    [['alarm', '--line', '0.1 %', '--rule', 'window', '--units', '100', ...confidence, '--count', '3'], '--count and --confidence: give one'],
    [['alarm', '--line', '0.1 %', '--rule', 'window', '--units', '2', '--confidence', '99.99999 %'], '--units: "2"; expected a window large enough'],
    [['alarm', '--line', '0.1 %', '--rule', 'detector', '--between', '10'], '--between is 10, expected a finite number above the rest level'],
    [['alarm', '--line', '0.1 %', '--rule', 'cusum', '--between', '1e6', '--worse', '500 ppm'], '--worse: "500 ppm"; expected a rate above the normal rate'],
    [['budget', '--false-calls', '1', '--stream', 'leak'], '--stream: "leak"; expected NAME=UNITS'],
    [['budget', '--false-calls', '0', '--stream', 'leak=5'], '--false-calls is 0, expected a finite number above 0'],
    [['budget', '--false-calls', '1'], '--stream is missing'],
  ])('%j', (args, complaint) => {
    const { code, out, err } = plan(...args);
    expect(err).toContain(complaint);
    expect({ code, out }).toEqual({ code: 2, out: '' });
  });
});
