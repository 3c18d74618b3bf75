/** Below `few` bytes an array of its own lies beside its object and is cheapest; from `many` on its own block pays. */
const [few, many] = [64, 4_096];
const blockBytes = 65_536;

let block = new ArrayBuffer(0);
let used = 0;

/** Place of `bytes` fresh zero bytes in `block`; never given twice. */
function take(bytes: number): number {
  if (used + bytes > block.byteLength) {
    block = new ArrayBuffer(blockBytes);
    used = 0;
  }
  const from = used;
  used += (bytes + 7) & ~7;
  return from;
}

/**
 * A column of zeros: columns of middling length are cut from one larger block of memory, one behind the other and
 * never twice, because a block for each costs more than filling it. Never transfer its buffer to another thread.
 */
export function newColumn(length: number): Float64Array<ArrayBuffer> {
  const bytes = length * 8;
  if (bytes <= few || bytes >= many) return new Float64Array(length);
  const from = take(bytes);
  return new Float64Array(block, from, length);
}

/** The same for zero bytes. */
export function newBytes(length: number): Uint8Array<ArrayBuffer> {
  if (length <= few || length >= many) return new Uint8Array(length);
  const from = take(length);
  return new Uint8Array(block, from, length);
}
