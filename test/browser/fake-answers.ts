import type { Happening } from '../../core/monitor/happening.ts';
import type { RunPaths } from '../../core/view/run-view.ts';
import type { History, Picture, Strip } from '../../core/view/history.ts';
import { alarms, plantStart, type FakeGuarantee } from './fake-plant.ts';

/** A history that ends where the guarantee's view stands: calm, then going where it went. */
export function historyOf({ card, view }: FakeGuarantee, from: number, to: number, points: number): History {
  const stepMs = Math.max(1000, Math.round((to - from) / points));
  const at = Array.from({ length: points }, (_, index) => from + index * stepMs);
  const reach = (allowance: number): number => card.target + (card.guaranteeLine - card.target) * allowance;
  const end = view.allowance.bound ?? 0.6;
  const wave = (index: number): number => 0.04 * Math.sin(index / 7) + 0.03 * Math.sin(index / 2.3);
  const allowance = at.map((_, index) => {
    const way = Math.max(0, (index / points - 0.55) / 0.45);
    return 0.7 + (end - 0.7) * way ** 1.6 + wave(index);
  });
  const alarm = alarms.find((one) => one.guarantee === card.id);
  const events: Happening[] = [
    { kind: 'line', at: (from + (to - from) * 0.18) as never, line: card.line, mark: 'changeover', detail: 'BH-5 to BH-4' },
    { kind: 'line', at: (from + (to - from) * 0.3) as never, line: card.line, mark: 'line-stopped', detail: 'break' },
    { kind: 'line', at: (from + (to - from) * 0.34) as never, line: card.line, mark: 'line-running', detail: '' },
    { kind: 'restart', at: (from + (to - from) * 0.42) as never, guarantee: card.id, by: 'Ines Maurer', reason: 'die changed', run: 2 },
    ...(alarm === undefined || alarm.raisedAt < from ? [] : [{ kind: 'alarm', at: alarm.raisedAt, change: 'raised', alarm } as const]),
  ];
  return {
    guarantee: card.id, from, to, at, stepMs,
    inspected: at.map((_, index) => (index / points > 0.3 && index / points < 0.34 ? 0 : 210 + (index % 5) * 7)),
    nonconforming: at.map((_, index) => (index % 11 === 3 || (index > points * 0.85 && index % 3 === 0) ? 1 + (index % 2) : 0)),
    estimate: allowance.map((value) => reach(value * 0.55)),
    bound: allowance.map((value, index) => (index < 4 ? null : reach(value))),
    opposite: allowance.map((value) => (view.allowance.opposite === undefined ? null : reach(value * 0.42))),
    state: allowance.map((value, index) => (view.state === 'unknown' && index > points * 0.9 ? 'unknown' : value <= 1 ? 'demonstrated' : value > 1.9 ? 'violated' : 'undecided')),
    events,
  };
}

export function stripOf({ card, view }: FakeGuarantee): Strip {
  if (card.scale.kind !== 'share' || card.window.kind === 'time') return { guarantee: card.id, units: 0, full: undefined, nonconforming: [], left: 0 };
  const units = view.figures['inspected'] ?? 900;
  const count = Math.min(400, view.figures['nonconforming'] ?? view.figures['count'] ?? 2);
  return {
    guarantee: card.id, units, full: card.window.kind === 'units' ? Math.max(units, card.window.units) : undefined, left: 0,
    nonconforming: Array.from({ length: count }, (_, index) => ({
      place: Math.floor(units * Math.sqrt((index + 0.6) / count)) - 1, at: plantStart - Math.round(3_500_000 * (1 - Math.sqrt((index + 0.6) / count))), source: 'leak-a-1', sequence: 800_000 + index * 31,
    })),
  };
}

export function pictureOf({ card }: FakeGuarantee): Picture {
  if (card.quantity === 'chained-yield') {
    return { kind: 'stations', stations: [
      { id: 'crimp', name: 'Crimping', inspected: 63, nonconforming: 0, yield: 1, limiting: false },
      { id: 'leak', name: 'Leak test', inspected: 63, nonconforming: 1, yield: 0.984, limiting: true },
      { id: 'final', name: 'Final inspection', inspected: 62, nonconforming: 0, yield: 1, limiting: false },
    ] };
  }
  const limit = card.specificationLimit;
  if (card.window.kind === 'time' && limit === undefined) {
    const { spanMs, stepMs } = card.window;
    const parts = Math.min(120, Math.round(spanMs / stepMs));
    return { kind: 'steps', from: plantStart - spanMs, stepMs: spanMs / parts, inspected: Array.from({ length: parts }, (_, part) => (part % 17 === 5 ? 0 : 290)), nonconforming: Array.from({ length: parts }, (_, part) => (part % 7 === 2 ? 1 + (part % 3) : 0)) };
  }
  if (limit === undefined) return { kind: 'none' };
  const [mean, sd, unit] = card.quantity === 'mean' ? [251.42, 1.31, 'ml'] : card.id === 'pull-bh5' ? [1381.2, 51.4, 'N'] : [1.9, 0.14, 'N m'];
  const edges = Array.from({ length: 31 }, (_, index) => mean + sd * (index - 15) * 0.25);
  const counts = edges.slice(1).map((edge) => Math.round(400 * Math.exp(-0.5 * ((edge - sd * 0.125 - mean) / sd) ** 2)));
  return { kind: 'distribution', unit, edges, counts, mean, sd, limit, model: { verdict: 'fits', sentence: 'The normal model fits: the test of normality gives p = 0.41 from 4,000 values.' } };
}

/** Evidence and gauge over the six hours of the run so far, for a guarantee that has a run. */
export function runPathsOf({ card, view }: FakeGuarantee): RunPaths {
  const begun = view.run?.begunAt ?? plantStart - 6 * 3_600_000;
  const marks = view.run === undefined ? 0 : 70;
  const at = Array.from({ length: marks }, (_, mark) => begun + (mark + 1) * 300_000);
  const toward = (end: number, late: number): number[] => at.map((_, mark) => end * (mark / marks) ** late + 0.12 * Math.sin(mark / 2));
  const gauge = view.detector?.gauge ?? 0;
  return {
    guarantee: card.id,
    run: { at, kept: toward(view.run?.kept ?? 0, 1), broken: toward(view.run?.broken ?? 0, 4) },
    gauge: { at, gauge: at.map((_, mark) => Math.max(0, Math.min(1, gauge * (mark / marks) ** 2 + 0.05 * Math.sin(mark)))) },
  };
}
