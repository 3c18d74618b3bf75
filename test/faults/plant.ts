/** A hose line and a bottling line whose guarantees use every quantity and every kind of window, in small sizes. */
export const faultPlant = `vouchline: 1
plant: { name: Hose works, time-zone: Europe/Copenhagen }
shifts:
  - { name: Early, days: Mon-Sun, from: "06:00", to: "14:00" }
  - { name: Late, days: Mon-Sun, from: "14:00", to: "22:00" }
  - { name: Night, days: Mon-Sun, from: "22:00", to: "06:00" }
lines:
  - id: A
    name: Hose line A
    stations:
      - { id: A.cutting, name: Cutting }
      - { id: A.crimping, name: Crimping }
      - { id: A.leak-test, name: Leak test }
      - { id: A.final, name: Final inspection }
  - { id: K, name: Fluid kit bottling, stations: [{ id: K.filling, name: Bottle filling }] }
products:
  - id: BH-4
    name: Brake hose 4 mm
    characteristics: &hose
      - { id: surface, name: Surface of the cut hose }
      - { id: pull-off-force, name: Crimp pull-off force, unit: N }
      - { id: tightness, name: Tightness }
      - { id: finish, name: Finish }
      - { id: outgoing, name: Outgoing hose }
  - { id: BH-5, name: Brake hose 5 mm, characteristics: *hose }
  - { id: FK-250, name: Fluid kit 250 ml, characteristics: [{ id: fill, name: Fill, unit: ml }] }
guarantees:
  - id: leak
    quantity: nonconforming-fraction
    station: A.leak-test
    characteristic: tightness
    at-most: 1 %
    normal-rate: 0.2 %
    window: { units: 1500 }
    safety-relevant: true
    alarms: { crossing: { priority: high, return: { units: 50 } }, silence: { after: 5 min }, bad-data: { more-than: 20, within: 1 h } }
  - id: leak-shift
    quantity: nonconforming-fraction
    station: A.leak-test
    characteristic: tightness
    at-most: 2 %
    window: shift
  - id: final
    quantity: yield
    station: A.final
    characteristic: finish
    at-least: 97 %
    window: { time: 30 min, step: 1 min }
  - id: flaws
    quantity: rate
    station: A.cutting
    characteristic: surface
    at-most: 2 per 100 m
    normal-rate: 1 per 100 m
    window: { units: 400 }
  - id: pull-off
    quantity: fraction-beyond-limit
    station: A.crimping
    characteristic: pull-off-force
    specification-limit: { below: 400 N }
    at-most: 2 %
    window: { units: 500 }
  - id: chain
    quantity: chained-yield
    stations: [A.leak-test, A.final]
    characteristics: [tightness, finish]
    at-least: 95 %
    window: run
  - id: fill
    quantity: mean
    station: K.filling
    product: FK-250
    characteristic: fill
    at-least: 250 ml
    target: 251 ml
    window: { units: 300 }
  - id: outgoing
    quantity: lot-fraction
    station: A.final
    characteristic: outgoing
    at-most: 5 %
    window: lot
`;
