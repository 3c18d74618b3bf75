/** Below this many numbers an array of its own lies beside its object and is cheapest; above, it pays for its own block. */
const [few, many] = [8, 512];
const roomNumbers = 8_192;

let room = new Float64Array(0);
let used = 0;

/**
 * A column of zeros of its own: columns of middling length are cut from one larger block of memory, one behind the
 * other and never twice, because a block for each costs more than filling it.
 */
export function newColumn(length: number): Float64Array {
  if (length <= few || length >= many) return new Float64Array(length);
  if (used + length > room.length) {
    room = new Float64Array(roomNumbers);
    used = 0;
  }
  used += length;
  return room.subarray(used - length, used);
}
