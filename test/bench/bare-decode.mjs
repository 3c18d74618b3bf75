// The ceiling of decoding: the columns of a binary frame with one part, copied out with nothing checked and nothing named.

export function decodeBinary(bytes, kind) {
  const view = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength);
  const first = view.getFloat64(8, true);
  const part = 24 + view.getUint32(20, true);
  const [form, records, listed] = [bytes[part + 1], view.getUint32(part + 4, true), view.getUint32(part + 8, true)];
  const start = bytes.byteOffset + part + 16;
  const steady = (form & 3) === 0;
  const behind = start + (steady ? 16 : 8 + Math.ceil(records / 2) * 8);
  const time = steady ? view.getFloat64(part + 16, true) : new Uint32Array(bytes.buffer.slice(start + 8, start + 8 + records * 4));
  const column = kind === 'verdicts'
    ? new Uint32Array(bytes.buffer.slice(behind, behind + listed * 4))
    : new Float64Array(bytes.buffer.slice(behind, behind + records * 8));
  return { first, records, time, column };
}
