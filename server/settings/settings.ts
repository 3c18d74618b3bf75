import type { LogLevel } from '../ops/log.ts';

/** Everything a server can be told: by flag, by environment variable or in the settings file, in this precedence. */
export interface Settings {
  readonly data: string;
  readonly plant: string | undefined;
  readonly host: string;
  readonly port: number;
  readonly clock: string;
  readonly logLevel: LogLevel;
  readonly snapshotMinutes: number;
  readonly snapshotEntries: number;
  readonly framesInFlight: number;
  readonly frameBytes: number;
  readonly dashboards: number;
  readonly tlsCert: string | undefined;
  readonly tlsKey: string | undefined;
  readonly trustedHops: string;
  readonly plainHttp: 'refused' | 'allowed';
  readonly requestsPerSecond: number;
  readonly upgradesPerSecond: number;
  readonly socketsPerAddress: number;
  readonly access: 'accounts' | 'open';
  readonly directoryIssuer: string | undefined;
  readonly directoryClient: string | undefined;
  readonly directorySecret: string | undefined;
  readonly directoryName: string;
  readonly sessionIdleHours: number;
  readonly sessionDays: number;
}

type Kind =
  | { readonly kind: 'text' }
  | { readonly kind: 'whole'; readonly from: number; readonly to: number }
  | { readonly kind: 'choice'; readonly of: readonly string[] };

/** One setting: its flag, its variable (VOUCHLINE_…) and its name in the settings file are made from `name`. */
export interface SettingRule {
  readonly key: keyof Settings;
  /** kebab-case: the flag without its dashes. */
  readonly name: string;
  readonly of: Kind;
  readonly preset: string | number | undefined;
  readonly help: string;
}

export const settingRules: readonly SettingRule[] = [
  { key: 'data', name: 'data', of: { kind: 'text' }, preset: '.data', help: 'data directory; made where it is missing' },
  { key: 'plant', name: 'plant', of: { kind: 'text' }, preset: undefined, help: 'plant file (YAML or JSON); plant.yaml in the data directory when absent' },
  { key: 'host', name: 'host', of: { kind: 'text' }, preset: '127.0.0.1', help: 'address to listen on' },
  { key: 'port', name: 'port', of: { kind: 'whole', from: 0, to: 65_535 }, preset: 7317, help: 'port to listen on; 0 takes a free one' },
  { key: 'clock', name: 'clock', of: { kind: 'text' }, preset: 'wall', help: "plant clock: 'wall', or 'records' to rehearse with stored records: it then stands at the newest record" },
  { key: 'logLevel', name: 'log-level', of: { kind: 'choice', of: ['debug', 'info', 'warn', 'error', 'silent'] }, preset: 'info', help: 'least severe entries to log' },
  { key: 'snapshotMinutes', name: 'snapshot-minutes', of: { kind: 'whole', from: 1, to: 1_440 }, preset: 5, help: 'minutes between snapshots of the whole state' },
  { key: 'snapshotEntries', name: 'snapshot-entries', of: { kind: 'whole', from: 1, to: 1_000_000_000 }, preset: 100_000, help: 'journal entries after which a snapshot is kept before its time: a start reads back about so many at most' },
  { key: 'framesInFlight', name: 'frames-in-flight', of: { kind: 'whole', from: 1, to: 10_000 }, preset: 64, help: 'frames a source may have sent and not yet seen acknowledged' },
  { key: 'frameBytes', name: 'frame-bytes', of: { kind: 'whole', from: 1_024, to: 67_108_864 }, preset: 1_048_576, help: 'largest frame, bytes' },
  { key: 'dashboards', name: 'dashboards', of: { kind: 'whole', from: 1, to: 100_000 }, preset: 5_000, help: 'dashboards connected at the same time at most' },
  { key: 'tlsCert', name: 'tls-cert', of: { kind: 'text' }, preset: undefined, help: 'certificate file (PEM) for HTTPS; taken up anew when it changes' },
  { key: 'tlsKey', name: 'tls-key', of: { kind: 'text' }, preset: undefined, help: 'its key file (PEM)' },
  { key: 'trustedHops', name: 'trusted-hops', of: { kind: 'text' }, preset: '', help: 'proxies in front whose word on client, host and TLS is believed: addresses or networks, separated by commas' },
  { key: 'plainHttp', name: 'plain-http', of: { kind: 'choice', of: ['refused', 'allowed'] }, preset: 'refused', help: 'allowed: listen beyond this machine without TLS, so that passwords and records can be read on the way' },
  { key: 'requestsPerSecond', name: 'requests-per-second', of: { kind: 'whole', from: 1, to: 1_000_000 }, preset: 100, help: 'requests a second from one address; ten times as many at once' },
  { key: 'upgradesPerSecond', name: 'upgrades-per-second', of: { kind: 'whole', from: 1, to: 1_000_000 }, preset: 500, help: 'sockets opened a second from one address; ten times as many at once' },
  { key: 'socketsPerAddress', name: 'sockets-per-address', of: { kind: 'whole', from: 1, to: 1_000_000 }, preset: 5_000, help: 'sockets open at the same time from one address at most' },
  { key: 'access', name: 'access', of: { kind: 'choice', of: ['accounts', 'open'] }, preset: 'accounts', help: 'accounts: people sign in, and each role does its work; open: whoever reaches the server does everything (on this machine only)' },
  { key: 'directoryIssuer', name: 'directory-issuer', of: { kind: 'text' }, preset: undefined, help: 'issuer (URL) of the OpenID Connect provider of the plant, where people may sign in through it' },
  { key: 'directoryClient', name: 'directory-client', of: { kind: 'text' }, preset: undefined, help: 'client id that the provider knows this server by' },
  { key: 'directorySecret', name: 'directory-secret', of: { kind: 'text' }, preset: undefined, help: 'its client secret; better as variable or in the settings file than as a flag' },
  { key: 'directoryName', name: 'directory-name', of: { kind: 'text' }, preset: 'the plant directory', help: 'what people call it' },
  { key: 'sessionIdleHours', name: 'session-idle-hours', of: { kind: 'whole', from: 1, to: 720 }, preset: 12, help: 'hours after which a session that is not used ends' },
  { key: 'sessionDays', name: 'session-days', of: { kind: 'whole', from: 1, to: 365 }, preset: 30, help: 'days after which every session ends' },
];

export const variableOf = (name: string): string => `VOUCHLINE_${name.toUpperCase().replaceAll('-', '_')}`;

/** A setting that cannot be used: which, from where, what it held, what was expected. */
export class BadSetting extends Error {}

/** Values as found, by setting name; undefined or absent where not told. */
export type Told = Readonly<Record<string, unknown>>;

/**
 * Settles every setting: flags before variables before the file before presets.
 *
 * @throws BadSetting naming the setting, where it was told, the value and what was expected
 */
export function settle(flags: Told, variables: Told, file: Told): Settings {
  for (const name of Object.keys(file)) {
    if (!settingRules.some((rule) => rule.name === name)) throw new BadSetting(`settings file: there is no setting "${name}"; expected one of ${settingRules.map((rule) => rule.name).join(', ')}`);
  }
  const settled: Record<string, unknown> = {};
  for (const rule of settingRules) {
    const places: readonly (readonly [string, unknown])[] = [
      [`--${rule.name}`, flags[rule.name]],
      [variableOf(rule.name), variables[variableOf(rule.name)]],
      [`settings file: ${rule.name}`, file[rule.name]],
    ];
    const told = places.find(([, value]) => value !== undefined && value !== '');
    settled[rule.key] = told === undefined ? rule.preset : checked(rule, told[0], told[1]);
  }
  return settled as unknown as Settings;
}

function checked({ of }: SettingRule, place: string, value: unknown): string | number {
  switch (of.kind) {
    case 'text':
      if (typeof value === 'string') return value;
      throw new BadSetting(`${place}: ${JSON.stringify(value)} is not a text`);
    case 'choice':
      if (typeof value === 'string' && of.of.includes(value)) return value;
      throw new BadSetting(`${place}: ${JSON.stringify(value)}; expected one of ${of.of.join(', ')}`);
    case 'whole': {
      const number = typeof value === 'string' && /^\d+$/.test(value) ? Number(value) : value;
      if (typeof number === 'number' && Number.isSafeInteger(number) && number >= of.from && number <= of.to) return number;
      throw new BadSetting(`${place}: ${JSON.stringify(value)}; expected a whole number from ${of.from} to ${of.to}`);
    }
  }
}
