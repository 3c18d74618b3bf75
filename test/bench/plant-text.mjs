// A plant of any size for the benchmarks: leak tests of hose lines, twenty stations a line, one guarantee a station.

export const stationOf = (stream) => `L${Math.floor(stream / 20)}.leak-test-${stream % 20}`;
export const product = 'BH-4';
export const characteristics = { verdicts: 'tightness', measurements: 'pull-off-force' };

/** Measured forces below this do not conform, newtons. */
export const leastForce = 1_000;

/** Units that demonstrate the guarantee of a probe; the first nonconforming one then crosses its line. */
export const probeUnits = 300;
export const probeStation = (probe) => `P.leak-test-${probe}`;
export const probeGuarantee = (probe) => `probe-${probe}`;

const probeOf = (probe) => ({
  id: probeGuarantee(probe),
  name: `Probe ${probe}`,
  station: probeStation(probe),
  characteristic: characteristics.verdicts,
  quantity: 'nonconforming-fraction',
  'at-most': '1 %',
  'normal-rate': '100 ppm',
  confidence: '95 %',
  window: { units: probeUnits },
  alarms: { crossing: { priority: 'medium', response: 'Hold the lot and call maintenance.' } },
});

/**
 * Text of a plant file: one guarantee a stream, at most 0.2 % nonconforming among the last 10,000 units, and as many
 * guarantees beside them that a single nonconforming unit takes over their line.
 *
 * @param kind 'verdicts', or 'measurements' judged by a limit
 */
export function plantText(streams, kind = 'verdicts', probes = 0) {
  const lines = Array.from({ length: Math.ceil(streams / 20) }, (_, line) => ({
    id: `L${line}`,
    name: `Hose line ${line}`,
    stations: Array.from({ length: Math.min(20, streams - line * 20) }, (_none, place) => ({ id: stationOf(line * 20 + place), name: `Leak test ${place}` })),
  }));
  if (probes > 0) lines.push({ id: 'P', name: 'Probes', stations: Array.from({ length: probes }, (_, probe) => ({ id: probeStation(probe), name: `Probe ${probe}` })) });
  const judged = kind === 'verdicts' ? { quantity: 'nonconforming-fraction' } : { quantity: 'fraction-beyond-limit', 'specification-limit': { below: `${leastForce} N` } };
  return JSON.stringify({
    vouchline: 1,
    plant: { name: 'Hose works', 'time-zone': 'Europe/Copenhagen' },
    lines,
    products: [{
      id: product,
      name: 'Brake hose 4 mm',
      characteristics: [{ id: characteristics.verdicts, name: 'Tightness' }, { id: characteristics.measurements, name: 'Pull-off force', unit: 'N' }],
    }],
    guarantees: [...Array.from({ length: streams }, (_, stream) => ({
      id: `leak-${stream}`,
      name: `Leak test ${stream}`,
      station: stationOf(stream),
      characteristic: characteristics[kind],
      'at-most': '0.2 %',
      'normal-rate': '500 ppm',
      window: { units: 10_000 },
      ...judged,
      alarms: {
        crossing: { priority: 'medium', response: 'Hold the lot and call maintenance.' },
        violation: { priority: 'high', response: 'Stop the line.' },
      },
    })), ...Array.from({ length: probes }, (_, probe) => probeOf(probe))],
  }, null, 1);
}
