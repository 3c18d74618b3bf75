import { BehaviorSubject, type Observable } from 'rxjs';

/** How shares of units are written. */
export type ShareUnit = 'ppm' | '%' | '1 in N';

/** What a person chose on this browser; kept there and nowhere else. */
export interface Settings {
  readonly shareUnit: ShareUnit;
  readonly theme: 'auto' | 'light' | 'dark';
  readonly wall: 'auto' | 'on' | 'off';
  readonly grouped: boolean;
  /** Name given when acknowledging; empty until the first time. */
  readonly personName: string;
}

export const defaultSettings: Settings = { shareUnit: 'ppm', theme: 'auto', wall: 'auto', grouped: false, personName: '' };

const key = 'vouchline-settings.1';

const among = <T extends string>(value: unknown, choices: readonly T[], other: T): T =>
  choices.find((choice) => choice === value) ?? other;

/** Settings as stored; whatever cannot be read falls back to its default, field by field. */
export function readSettings(text: string | null): Settings {
  let stored: Partial<Record<keyof Settings, unknown>> = {};
  try {
    const value: unknown = JSON.parse(text ?? '{}');
    if (typeof value === 'object' && value !== null) stored = value;
  } catch {
    return defaultSettings;
  }
  return {
    shareUnit: among(stored.shareUnit, ['ppm', '%', '1 in N'], defaultSettings.shareUnit),
    theme: among(stored.theme, ['auto', 'light', 'dark'], defaultSettings.theme),
    wall: among(stored.wall, ['auto', 'on', 'off'], defaultSettings.wall),
    grouped: stored.grouped === true,
    personName: typeof stored.personName === 'string' ? stored.personName.slice(0, 80) : '',
  };
}

export interface SettingsDesk {
  readonly settings$: Observable<Settings>;
  readonly change: (part: Partial<Settings>) => void;
}

/** Settings of this browser. A browser that keeps nothing (private mode) still has them while the page is open. */
export function settingsIn(storage: Pick<Storage, 'getItem' | 'setItem'>): SettingsDesk {
  const settings$ = new BehaviorSubject(readSettings(storage.getItem(key)));
  return {
    settings$: settings$.asObservable(),
    change: (part) => {
      const next = { ...settings$.value, ...part };
      storage.setItem(key, JSON.stringify(next));
      settings$.next(next);
    },
  };
}
