import type { Frame, Origin } from '../../../core/record/part.ts';

export const leak: Origin = { station: 'a-leak', product: 'hose-12', characteristic: 'leak', lot: undefined };
export const force: Origin = { station: 'a-crimp', product: 'hose-12', characteristic: 'pull-off-force', lot: 'L-2041' };
const at = 1_764_547_200_000;
const steady = { kind: 'steady', start: at, step: 250 } as const;
const leakJson = '"station":"a-leak","product":"hose-12","characteristic":"leak"';
const forceJson = '"station":"a-crimp","product":"hose-12","characteristic":"pull-off-force","lot":"L-2041"';

export interface FrameCase {
  readonly name: string;
  readonly json: string;
  readonly frame: Frame;
}

function alone(name: string, json: string, part: Frame['parts'][number], first = 1): FrameCase {
  return { name, json: `{"type":"records","first":${first},"parts":[${json}]}`, frame: { first, records: part.records, parts: [part] } };
}

/** The same frames in both forms; each meaning stands here once. */
export const frameCases: readonly FrameCase[] = [
  alone('one conforming unit', `{"kind":"verdicts",${leakJson},"units":1,"nonconforming":[],"time":${at}}`, {
    kind: 'verdicts', origin: leak, records: 1, time: { kind: 'steady', start: at, step: 0 }, nonconforming: Uint32Array.of(),
  }),
  alone('a thousand units, two nonconforming', `{"kind":"verdicts",${leakJson},"units":1000,"nonconforming":[17,503],"time":{"start":${at},"step":250}}`, {
    kind: 'verdicts', origin: leak, records: 1000, time: steady, nonconforming: Uint32Array.of(17, 503),
  }, 41),
  alone('so many nonconforming that bits are shorter', `{"kind":"verdicts",${leakJson},"units":11,"nonconforming":[0,1,7,8,10],"time":${at}}`, {
    kind: 'verdicts', origin: leak, records: 11, time: { kind: 'steady', start: at, step: 0 }, nonconforming: Uint32Array.of(0, 1, 7, 8, 10),
  }),
  alone('times that fall', `{"kind":"verdicts",${leakJson},"units":3,"nonconforming":[2],"time":[${at},${at - 9},${at + 4}]}`, {
    kind: 'verdicts', origin: leak, records: 3, time: { kind: 'each', times: Float64Array.of(at, at - 9, at + 4) }, nonconforming: Uint32Array.of(2),
  }),
  alone('times further apart than 32 bits hold', `{"kind":"verdicts",${leakJson},"units":2,"nonconforming":[],"time":[0,${at}]}`, {
    kind: 'verdicts', origin: leak, records: 2, time: { kind: 'each', times: Float64Array.of(0, at) }, nonconforming: Uint32Array.of(),
  }),
  alone('tallies', `{"kind":"tallies",${leakJson},"inspected":[50,4294967295],"nonconforming":[50,0],"time":[${at},${at + 1}]}`, {
    kind: 'tallies', origin: leak, records: 2, time: { kind: 'each', times: Float64Array.of(at, at + 1) },
    inspected: Uint32Array.of(50, 4_294_967_295), nonconforming: Uint32Array.of(50, 0),
  }, 9_007_199_254_740_000),
  alone('flaws over metres', `{"kind":"exposures",${leakJson},"count":[0,3,1],"exposure":[12.5,100,1e-3],"time":{"start":${at},"step":333.25}}`, {
    kind: 'exposures', origin: leak, records: 3, time: { kind: 'steady', start: at, step: 333.25 },
    count: Uint32Array.of(0, 3, 1), exposure: Float64Array.of(12.5, 100, 1e-3),
  }),
  alone('measurements of a lot', `{"kind":"measurements",${forceJson},"value":[1520.25,-0.5],"time":{"start":${at},"step":250}}`, {
    kind: 'measurements', origin: force, records: 2, time: steady, value: Float64Array.of(1520.25, -0.5),
  }),
  ...([
    ['a corrected verdict', '{"kind":"verdict","nonconforming":true}', { kind: 'verdict', nonconforming: true }],
    ['a corrected tally', '{"kind":"tally","inspected":7,"nonconforming":2}', { kind: 'tally', inspected: 7, nonconforming: 2 }],
    ['a corrected count', '{"kind":"exposure","count":2,"exposure":0.5}', { kind: 'exposure', count: 2, exposure: 0.5 }],
    ['a corrected measurement', '{"kind":"measurement","value":-3.25}', { kind: 'measurement', value: -3.25 }],
  ] as const).map(([name, json, finding]) =>
    alone(name, `{"kind":"correction",${forceJson},"time":${at},"corrects":41,"finding":${json},"reason":"Schlauch nachgeprüft – 漏れ無し 🙂"}`, {
      kind: 'correction', records: 1, origin: force, at, corrects: 41, finding, reason: 'Schlauch nachgeprüft – 漏れ無し 🙂',
    }, 42)),
  alone('changeover', `{"kind":"changeover","line":"A","product":"hose-15","time":${at}}`, { kind: 'changeover', records: 1, at, line: 'A', product: 'hose-15' }),
  alone('start of a lot', `{"kind":"lot-start","line":"A","product":"hose-15","lot":"L-1","size":500,"time":${at}}`, {
    kind: 'lot-start', records: 1, at, line: 'A', product: 'hose-15', lot: 'L-1', size: 500,
  }),
  alone('start of a lot of unknown size', `{"kind":"lot-start","line":"A","product":"hose-15","lot":"L-1","time":${at}}`, {
    kind: 'lot-start', records: 1, at, line: 'A', product: 'hose-15', lot: 'L-1', size: undefined,
  }),
  alone('end of a lot', `{"kind":"lot-end","line":"A","lot":"L-1","time":${at}}`, { kind: 'lot-end', records: 1, at, line: 'A', lot: 'L-1' }),
  alone('line stopped', `{"kind":"line-stopped","line":"A","reason":"crimp tool changed","time":${at}}`, {
    kind: 'line-stopped', records: 1, at, line: 'A', reason: 'crimp tool changed',
  }),
  alone('line running', `{"kind":"line-running","line":"A","time":${at}}`, { kind: 'line-running', records: 1, at, line: 'A' }),
  alone('more records lost than a frame may hold', `{"kind":"lost","station":"a-leak","records":4000000000,"reason":"buffer overrun","time":${at}}`, {
    kind: 'lost', records: 4_000_000_000, at, station: 'a-leak', reason: 'buffer overrun',
  }),
  {
    name: 'several stations and kinds in one frame',
    json: `{"type":"records","first":7,"parts":[{"kind":"verdicts",${leakJson},"units":2,"nonconforming":[1],"time":${at}},`
      + `{"kind":"measurements",${forceJson},"value":[1],"time":${at}},{"kind":"verdicts",${leakJson},"units":3,"nonconforming":[],"time":${at}}]}`,
    frame: {
      first: 7, records: 6, parts: [
        { kind: 'verdicts', origin: leak, records: 2, time: { kind: 'steady', start: at, step: 0 }, nonconforming: Uint32Array.of(1) },
        { kind: 'measurements', origin: force, records: 1, time: { kind: 'steady', start: at, step: 0 }, value: Float64Array.of(1) },
        { kind: 'verdicts', origin: leak, records: 3, time: { kind: 'steady', start: at, step: 0 }, nonconforming: Uint32Array.of() },
      ],
    },
  },
];
