/**
 * The largest whole number in [low, high] at which `holds` is true, for a condition that is true up
 * to some number and false from there on. Steps from the guess double until the change is caught.
 *
 * @param guess any number; the nearer to the answer the fewer questions
 * @returns low - 1 when it holds nowhere
 */
export function lastWhere(holds: (at: number) => boolean, low: number, high: number, guess: number): number {
  const first = Math.min(Math.max(Math.floor(guess), low), high);
  let good = low - 1;
  let bad = high + 1;
  const up = holds(first);
  if (up) good = first;
  else bad = first;
  for (let stride = 1; good + 1 < bad; stride *= 2) {
    const next = up ? good + stride : bad - stride;
    if (next >= bad || next <= good) break;
    const held = holds(next);
    if (held) good = next;
    else bad = next;
    if (held !== up) break;
  }
  while (good + 1 < bad) {
    const middle = good + Math.floor((bad - good) / 2);
    if (holds(middle)) good = middle;
    else bad = middle;
  }
  return good;
}
