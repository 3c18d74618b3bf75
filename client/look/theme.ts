import type { Settings } from '../settings.ts';

/** Light, dark, or as the system has it. */
export function showTheme(theme: Settings['theme']): void {
  if (theme === 'auto') delete document.documentElement.dataset['theme'];
  else document.documentElement.dataset['theme'] = theme;
}
