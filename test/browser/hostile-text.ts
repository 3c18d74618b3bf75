/** What would run if a text were ever taken for markup. */
export const hostile = '<img src=x onerror="globalThis.broken=1"><script>globalThis.broken=1</script>';

/** Names of fields that people, sources and plant files fill with text. */
const written: ReadonlySet<string> = new Set([
  'name', 'lineName', 'stationNames', 'productName', 'characteristicName', 'remark', 'warnings', 'lot', 'response', 'note', 'by', 'sentence', 'detail', 'reason', 'shownAs',
  'agent', 'address', 'who', 'what', 'why', 'before', 'after', 'stations', 'products', 'directory', 'source', 'message',
]);

/** The same with hostile text at the end of every text that somebody wrote; ids stay. */
export function withHostileText<T>(value: T, field = ''): T {
  if (typeof value === 'string') return (written.has(field) ? `${value} ${hostile}` : value) as T;
  if (Array.isArray(value)) return value.map((one) => withHostileText<unknown>(one, field)) as T;
  if (typeof value !== 'object' || value === null) return value;
  return Object.fromEntries(Object.entries(value).map(([name, part]) => [name, withHostileText<unknown>(part, typeof part === 'string' && written.has(field) ? field : name)])) as T;
}
