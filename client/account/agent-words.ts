const browsers = [['Edg/', 'Edge'], ['OPR/', 'Opera'], ['Firefox/', 'Firefox'], ['Chrome/', 'Chrome'], ['Safari/', 'Safari']] as const;
const systems = [['Android', 'Android'], ['iPhone', 'iPhone'], ['iPad', 'iPad'], ['Windows', 'Windows'], ['Mac OS', 'macOS'], ['CrOS', 'ChromeOS'], ['Linux', 'Linux']] as const;

/** What a browser says it is, in two words; what is not known is shown as it was said, cut. */
export function agentWords(agent: string): string {
  const named = (table: readonly (readonly [string, string])[]): string | undefined => table.find(([mark]) => agent.includes(mark))?.[1];
  const browser = named(browsers);
  const system = named(systems);
  if (browser === undefined) return agent === '' ? 'Unknown program' : agent.slice(0, 60);
  return system === undefined ? browser : `${browser} on ${system}`;
}
