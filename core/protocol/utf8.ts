/** UTF-8 of short texts, here because core runs where no TextDecoder is promised; texts must be well-formed. */

export function utf8Of(text: string): Uint8Array {
  const bytes: number[] = [];
  for (const character of text) {
    const point = character.codePointAt(0) as number;
    if (point < 0x80) bytes.push(point);
    else if (point < 0x800) bytes.push(0xc0 | (point >> 6), 0x80 | (point & 63));
    else if (point < 0x10000) bytes.push(0xe0 | (point >> 12), 0x80 | ((point >> 6) & 63), 0x80 | (point & 63));
    else bytes.push(0xf0 | (point >> 18), 0x80 | ((point >> 12) & 63), 0x80 | ((point >> 6) & 63), 0x80 | (point & 63));
  }
  return Uint8Array.from(bytes);
}

/**
 * The text these bytes spell, or undefined when they are not UTF-8.
 *
 * @source RFC 3629, section 4 (overlong forms, surrogates and points beyond U+10FFFF are no UTF-8)
 */
export function textOfUtf8(bytes: Uint8Array): string | undefined {
  let text = '';
  for (let i = 0; i < bytes.length;) {
    const lead = bytes[i] as number;
    const more = lead < 0x80 ? 0 : lead < 0xc2 ? -1 : lead < 0xe0 ? 1 : lead < 0xf0 ? 2 : lead < 0xf5 ? 3 : -1;
    if (more < 0) return undefined;
    let point = more === 0 ? lead : lead & (0x3f >> more);
    for (let k = 1; k <= more; k += 1) {
      const next = bytes[i + k];
      if (next === undefined || (next & 0xc0) !== 0x80) return undefined;
      point = (point << 6) | (next & 0x3f);
    }
    if ((more === 2 && point < 0x800) || (more === 3 && point < 0x10000)) return undefined;
    if (point > 0x10ffff || (point >= 0xd800 && point <= 0xdfff)) return undefined;
    text += String.fromCodePoint(point);
    i += more + 1;
  }
  return text;
}
