const steps = [
  { ms: 86_400_000, name: 'd' },
  { ms: 3_600_000, name: 'h' },
  { ms: 60_000, name: 'min' },
  { ms: 1000, name: 's' },
] as const;

/** A span of time in its two largest units: '3 h 12 min'; 'under 1 s' for what is shorter. */
export function writeSpan(ms: number, whole: (value: number) => string): string {
  if (!Number.isFinite(ms)) return '–';
  const first = steps.findIndex((step) => ms >= step.ms);
  const large = steps[first];
  if (large === undefined) return 'under 1 s';
  const small = steps[first + 1];
  const larges = Math.floor(ms / large.ms);
  const rest = small === undefined ? 0 : Math.floor((ms - larges * large.ms) / small.ms);
  const head = `${whole(larges)} ${large.name}`;
  return small === undefined || rest === 0 ? head : `${head} ${whole(rest)} ${small.name}`;
}
