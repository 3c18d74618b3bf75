import { OutOfDomain } from '../../core/bound/out-of-domain.ts';

/** @throws OutOfDomain unless the method is exact: at all looks there is one evidence, and one bound of it */
export function requireExact(method: string): void {
  if (method !== 'exact') throw new OutOfDomain('method', method, 'no method beside looks all, which has its own');
}
