import { isIPv6 } from 'node:net';

/**
 * What stands for one place when tries are counted: an IPv4 address itself, of an IPv6 address its first 64 bits,
 * because whoever has one of them has them all.
 *
 * @source IETF RFC 4291 section 2.5.4 (from memory)
 */
export function networkOf(address: string): string {
  const bare = address.replace(/%.*$/, '').replace(/^::ffff:(?=\d+\.)/i, '');
  if (!isIPv6(bare)) return bare;
  const [left = '', right = ''] = new URL(`http://[${bare}]`).hostname.slice(1, -1).split('::');
  const groups = (text: string): string[] => (text === '' ? [] : text.split(':'));
  const [first, last] = [groups(left), groups(right)];
  const all = [...first, ...Array<string>(8 - first.length - last.length).fill('0'), ...last];
  return `${all.slice(0, 4).join(':')}::/64`;
}
