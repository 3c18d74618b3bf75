/** A small sound plant file; `guarantee` is put in as its only guarantee, indented as a list entry. */
export function smallPlant(guarantee: string, head = ''): string {
  return `vouchline: 1
plant: { name: Hose works, time-zone: Europe/Copenhagen }
${head}lines:
  - id: A
    stations: [{ id: A.crimp }, { id: A.leak }, { id: A.final }]
  - id: B
    stations: [{ id: B.crimp }, { id: B.leak }]
products:
  - id: BH-4
    characteristics: [{ id: tightness }, { id: force, unit: N }, { id: finish }]
  - id: BH-5
    characteristics: [{ id: tightness }, { id: force, unit: kN }]
guarantees:
  - ${guarantee.trim().split('\n').join('\n    ')}
`;
}

/** First line of the guarantee in a small plant without a head of its own. */
export const guaranteeLine = 14;

export const leak = `id: leak-A
quantity: nonconforming-fraction
station: A.leak
characteristic: tightness
at-most: 200 ppm
normal-rate: 50 ppm
window: { units: 20000 }`;
