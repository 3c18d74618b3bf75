import { Composer, LineCounter, Parser, type CST } from 'yaml';
import { fault, type Result } from '../result.ts';
import type { PlantFault, Place } from './plant-fault.ts';
import { plantTreeOf, type PlantTree } from './plant-tree.ts';

/** Longest plant file, bytes of UTF-8. */
export const mostPlantBytes = 4 * 1024 * 1024;

/** Deepest nesting of lists and mappings. The library descends by recursion, so this is checked before it does. */
export const deepestNesting = 32;

/** Reads YAML 1.2 or JSON into plain values that remember where they stood. Faults: not one well-formed document. */
export function plantTreeOfText(text: string): Result<PlantTree, readonly PlantFault[]> {
  const bytes = utf8Bytes(text);
  const whole: Place = { line: 1, column: 1 };
  if (bytes > mostPlantBytes) return refused(whole, `${bytes} bytes`, `at most ${mostPlantBytes} bytes`);
  const lines = new LineCounter();
  const tokens = [...new Parser(lines.addNewLine).parse(text)];
  const placeAt = (offset: number): Place => {
    const { line, col } = lines.linePos(offset);
    return { line: Math.max(line, 1), column: Math.max(col, 1) };
  };
  const tooDeep = deeperThan(tokens, deepestNesting);
  if (tooDeep !== undefined) {
    return refused(placeAt(tooDeep), 'deeper nesting', `at most ${deepestNesting} levels of lists and mappings`);
  }
  const documents = [...new Composer({ uniqueKeys: false }).compose(tokens, true, text.length)];
  const broken = documents.flatMap(({ errors, warnings }) => [...errors, ...warnings]);
  const second = documents[1];
  if (second !== undefined) return refused(placeAt(second.range[0]), 'a second document', 'one document in the file');
  if (broken.length > 0) return fault(broken.map(({ pos, message }) => malformed(placeAt(pos[0]), text, pos[0], message)));
  const contents = documents[0]?.contents ?? undefined;
  return contents === undefined ? refused(whole, 'an empty file', 'a plant file') : plantTreeOf(contents, placeAt);
}

function refused({ line, column }: Place, found: string, expected: string): Result<never, readonly PlantFault[]> {
  const sentence = `The file (line ${line}): ${found} does not fit; expected ${expected}.`;
  return fault([{ line, column, field: '', found, expected, sentence }]);
}

function malformed({ line, column }: Place, text: string, offset: number, reason: string): PlantFault {
  const found = text.slice(offset, offset + 40).split('\n', 1)[0] ?? '';
  const expected = 'well-formed YAML 1.2 or JSON';
  return { line, column, field: '', found, expected, sentence: `The file (line ${line}): ${reason.replace(/[.:]?$/, '')}; expected ${expected}.` };
}

/** Offset of the first token that lies deeper than some levels; walks with a list of its own, not by recursion. */
function deeperThan(tokens: readonly CST.Token[], levels: number): number | undefined {
  const open: [token: CST.Token, depth: number][] = tokens.map((token) => [token, 0]);
  for (let next = open.pop(); next !== undefined; next = open.pop()) {
    const [token, depth] = next;
    if (depth > levels) return token.offset;
    if (token.type === 'document' && token.value !== undefined) open.push([token.value, 1]);
    for (const { key, value } of 'items' in token ? token.items : []) {
      if (key) open.push([key, depth + 1]);
      if (value) open.push([value, depth + 1]);
    }
  }
  return undefined;
}

function utf8Bytes(text: string): number {
  let bytes = text.length;
  for (let at = 0; at < text.length; at += 1) {
    const code = text.charCodeAt(at);
    if (code > 0x7f) bytes += code > 0x7ff && (code < 0xd800 || code > 0xdfff) ? 2 : 1;
  }
  return bytes;
}
