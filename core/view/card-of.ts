import { methodOf } from '../evidence/method.ts';
import { decimalComplement } from '../figure/decimal-complement.ts';
import { runMethodOf } from '../run/run-method.ts';
import { guaranteeLineOf } from '../plant/guarantee-line.ts';
import type { Guarantee, Promised } from '../plant/guarantee.ts';
import type { Plant } from '../plant/plant.ts';
import type { GuaranteeCard, Scale } from './guarantee-view.ts';

/** What screens need to know of a guarantee that does not change while its plant file is in force. */
export function cardOf(guarantee: Guarantee, plant: Plant): GuaranteeCard {
  const { promise } = guarantee;
  const line = plant.lines.find(({ id }) => id === guarantee.line);
  const product = plant.products.find(({ id }) => id === guarantee.product);
  const { side, line: guaranteeLine, target } = guaranteeLineOf(promise);
  const { name, sentence, assumes, source } = (guarantee.looks === 'all looks' ? runMethodOf(guarantee) : undefined) ?? methodOf(guarantee);
  return {
    id: guarantee.id,
    name: guarantee.name,
    line: guarantee.line,
    lineName: line?.name ?? guarantee.line,
    stationNames: guarantee.stations.map((id) => line?.stations.find((station) => station.id === id)?.name ?? id),
    product: guarantee.product,
    productName: product?.name,
    characteristicName: characteristicName(guarantee, plant),
    quantity: promise.quantity,
    side,
    scale: scaleOf(promise),
    guaranteeLine,
    target,
    confidence: String(decimalComplement(guarantee.tail)),
    tail: guarantee.tail,
    window: guarantee.window,
    looks: guarantee.looks,
    safetyRelevant: guarantee.safetyRelevant,
    specificationLimit: promise.quantity === 'fraction-beyond-limit' ? { ...promise.limit, unit: promise.unit } : undefined,
    method: { name, sentence, assumes, source },
  };
}

function characteristicName(guarantee: Guarantee, plant: Plant): string {
  const names = guarantee.characteristics.map((id) => {
    for (const product of plant.products) {
      if (guarantee.product !== undefined && product.id !== guarantee.product) continue;
      const known = product.characteristics.find((characteristic) => characteristic.id === id);
      if (known) return known.name;
    }
    return id;
  });
  return [...new Set(names)].join(', ');
}

function scaleOf(promise: Promised): Scale {
  switch (promise.quantity) {
    case 'rate':
      return { kind: 'rate', per: promise.per, unit: promise.unit };
    case 'mean':
      return { kind: 'measure', unit: promise.unit };
    case 'nonconforming-fraction':
    case 'yield':
    case 'fraction-beyond-limit':
    case 'chained-yield':
    case 'lot-fraction':
      return { kind: 'share' };
  }
}
