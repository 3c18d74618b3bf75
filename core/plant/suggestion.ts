/**
 * The one of some words that was probably meant: the nearest by single-letter edits.
 *
 * @returns undefined if none is near: more than two edits, or more than a third of the word, away
 */
export function suggestionFor(word: string, known: readonly string[]): string | undefined {
  let best: string | undefined;
  let fewest = Math.min(2, Math.ceil(word.length / 3)) + 1;
  for (const candidate of known) {
    if (Math.abs(candidate.length - word.length) >= fewest) continue;
    const edits = editsBetween(word.toLowerCase(), candidate.toLowerCase());
    if (edits < fewest) [best, fewest] = [candidate, edits];
  }
  return best;
}

/** Letters put in, left out or changed to get from one word to the other. @source Levenshtein 1966 (memory) */
function editsBetween(from: string, to: string): number {
  let row = Array.from({ length: to.length + 1 }, (_, at) => at);
  for (let i = 1; i <= from.length; i += 1) {
    const next = [i];
    for (let j = 1; j <= to.length; j += 1) {
      const kept = (row[j - 1] ?? 0) + (from[i - 1] === to[j - 1] ? 0 : 1);
      next.push(Math.min(kept, (row[j] ?? 0) + 1, (next[j - 1] ?? 0) + 1));
    }
    row = next;
  }
  return row[to.length] ?? 0;
}
