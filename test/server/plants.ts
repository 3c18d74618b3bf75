/** One leak test on one line: at most 1 %, the last 1,000 units. */
export const leakPlant = `vouchline: 1
plant: { name: Hose works, time-zone: Europe/Copenhagen }
shifts:
  - { name: Early, days: Mon-Sun, from: "06:00", to: "14:00" }
lines:
  - { id: A, name: Hose line A, stations: [{ id: A.leak-test, name: Leak test }] }
products:
  - { id: BH-4, name: Brake hose 4 mm, characteristics: [{ id: tightness, name: Tightness }] }
guarantees:
  - id: leak-A
    name: Leak test, line A
    station: A.leak-test
    characteristic: tightness
    quantity: nonconforming-fraction
    at-most: 1 %
    confidence: 95 %
    window: { units: 1000 }
    safety-relevant: true
    alarms:
      crossing: { priority: medium, return: { units: 50 }, response: Hold the lot and call maintenance. }
      deterioration: off
`;

/** A JSON part of verdicts, one second apart. */
export function verdictPart(units: number, nonconforming: readonly number[], start: number, more: object = {}): object {
  return { kind: 'verdicts', station: 'A.leak-test', product: 'BH-4', characteristic: 'tightness', units, nonconforming, time: { start, step: 1000 }, ...more };
}
