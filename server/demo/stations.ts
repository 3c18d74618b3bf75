import type { LineId, ProductId } from '../../core/record/part.ts';

/**
 * What a station of the demo says of its units, `perMinute` records a minute of the running line. `level` is how it
 * is when all is well: the chance of a nonconforming unit, flaws per 100 m, or the mean of the measured values.
 */
export type Stream =
  | { readonly kind: 'verdicts'; readonly characteristic: string; readonly perMinute: number; readonly level: number; /** Share of rejects that a second look passes. */ readonly passedLater?: number }
  | { readonly kind: 'tallies'; readonly characteristic: string; readonly perMinute: 1; readonly units: number; readonly level: number }
  | { readonly kind: 'exposures'; readonly characteristic: string; readonly perMinute: number; readonly metres: number; readonly level: number }
  | { readonly kind: 'measurements'; readonly characteristic: string; readonly perMinute: number; readonly sd: number; /** Smallest step of the device. */ readonly step: number; readonly level: number };

export interface DemoStation {
  readonly id: string;
  readonly line: LineId;
  /** It tells what the line does: product, lots, stops. */
  readonly leads: boolean;
  readonly streams: readonly Stream[];
}

export type HoseLine = 'A' | 'B';
export const hoseLines: readonly HoseLine[] = ['A', 'B'];
/** Hoses a minute of a running hose line. */
export const hosesPerMinute = 40;
export const bottlesPerMinute = 60;

/** How well each line is when it is well; no two lines are quite alike. */
const well = {
  A: { flaws: 0.95, crimp: 0.003, force: 517, leak: 250e-6, finish: 0.0065 },
  B: { flaws: 1.05, crimp: 0.0035, force: 509.5, leak: 200e-6, finish: 0.0085 },
} as const;

function hoseStations(line: HoseLine): DemoStation[] {
  const { flaws, crimp, force, leak, finish } = well[line];
  const perMinute = hosesPerMinute;
  return [
    { id: `${line}.cutting`, line, leads: true, streams: [{ kind: 'exposures', characteristic: 'surface', perMinute, metres: 1.5, level: flaws }] },
    {
      id: `${line}.crimping`, line, leads: false, streams: [
        { kind: 'verdicts', characteristic: 'crimp', perMinute, level: crimp },
        { kind: 'measurements', characteristic: 'pull-off-force', perMinute: perMinute / 2, sd: 38, step: 0.5, level: force },
      ],
    },
    { id: `${line}.leak-test`, line, leads: false, streams: [{ kind: 'verdicts', characteristic: 'tightness', perMinute, level: leak }] },
    {
      id: `${line}.final-inspection`, line, leads: false, streams: [
        { kind: 'verdicts', characteristic: 'finish', perMinute, level: finish, passedLater: 0.15 },
        { kind: 'verdicts', characteristic: 'outgoing', perMinute: perMinute / 2, level: 0.0003 },
      ],
    },
  ];
}

/** Every station of the demo plant, line by line, in the order the units pass them. */
export const demoStations: readonly DemoStation[] = [
  ...hoseLines.flatMap(hoseStations),
  { id: 'K.filling', line: 'K', leads: true, streams: [{ kind: 'measurements', characteristic: 'fill', perMinute: bottlesPerMinute, sd: 1.4, step: 0.1, level: 250.5 }] },
  { id: 'K.packing', line: 'K', leads: false, streams: [{ kind: 'tallies', characteristic: 'kit', perMinute: 1, units: bottlesPerMinute, level: 0.001 }] },
];

/** The product a line makes when nobody changed it over. */
export const usualProduct = (line: LineId): ProductId => (line === 'K' ? 'FK-250' : 'BH-4');
