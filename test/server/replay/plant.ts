/** Every quantity once, with every alarm, on small windows: files of some thousand rows make much happen. */
export const everyQuantity = `vouchline: 1
plant: { name: Hose works, time-zone: Europe/Copenhagen }
shifts:
  - { name: Early, days: Mon-Sun, from: "06:00", to: "14:00" }
  - { name: Late, days: Mon-Sun, from: "14:00", to: "22:00" }
lines:
  - { id: A, name: Hose line A, stations: [{ id: A.cutting }, { id: A.crimping }, { id: A.leak-test }, { id: A.final }] }
  - { id: K, name: Bottling, stations: [{ id: K.filling }] }
products:
  - id: BH-4
    characteristics: [{ id: surface }, { id: crimp }, { id: force, unit: N }, { id: tightness }, { id: finish }, { id: outgoing }]
  - id: BH-5
    characteristics: [{ id: tightness }, { id: finish }]
  - { id: FK-250, characteristics: [{ id: fill, unit: ml }] }
guarantees:
  - id: leak
    quantity: nonconforming-fraction
    station: A.leak-test
    characteristic: tightness
    at-most: 1 %
    normal-rate: 0.2 %
    window: { units: 800 }
    safety-relevant: true
    alarms: { silence: { after: 5 min, response: Look. }, bad-data: { response: Look. } }
  - { id: leak-shift, quantity: nonconforming-fraction, station: A.leak-test, characteristic: tightness, at-most: 1 %, window: shift }
  - { id: leak-hour, quantity: nonconforming-fraction, station: A.leak-test, characteristic: tightness, at-most: 2 %, window: { time: 30 min, step: 1 min } }
  - { id: final, quantity: yield, station: A.final, characteristic: finish, at-least: 97 %, window: run }
  - { id: flaws, quantity: rate, station: A.cutting, characteristic: surface, at-most: 3 per 100 m, window: { units: 400 } }
  - { id: pull, quantity: fraction-beyond-limit, station: A.crimping, characteristic: force, specification-limit: { below: 400 N }, at-most: 2 %, window: { units: 300 } }
  - { id: pull-normal, quantity: fraction-beyond-limit, station: A.crimping, characteristic: force, specification-limit: { below: 400 N }, at-most: 2 %, model: normal, window: { units: 300 } }
  - { id: fill, quantity: mean, station: K.filling, product: FK-250, characteristic: fill, at-least: 250 ml, target: 251 ml, window: { units: 200 } }
  - { id: chain, quantity: chained-yield, stations: [A.crimping, A.leak-test, A.final], characteristics: [crimp, tightness, finish], at-least: 93 %, window: { units: 500 } }
  - { id: lot, quantity: lot-fraction, station: A.final, characteristic: outgoing, at-most: 4 %, window: lot }
`;
