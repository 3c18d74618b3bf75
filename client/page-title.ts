import type { Route } from './route.ts';

const pageName: Readonly<Record<Exclude<Route['kind'], 'board' | 'guarantee'>, string>> = {
  alarms: 'Alarms', 'sign-in': 'Sign in', join: 'Join', display: 'Display', account: 'My account', people: 'People',
  displays: 'Displays', sources: 'Sources', changes: 'Record of changes', nowhere: 'No such page',
};

/** What the window is called. */
export const pageTitle = ({ kind }: Route): string => (kind === 'board' || kind === 'guarantee' ? 'Vouchline' : `${pageName[kind]}, Vouchline`);
