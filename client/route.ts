/** Pages that have no more to their address than their name. */
const plainPages = ['alarms', 'sign-in', 'join', 'display', 'account', 'people', 'displays', 'sources', 'changes'] as const;
export type PlainPage = (typeof plainPages)[number];

/** The pages and their addresses: `/`, `/guarantees/:id`, and `/` with a plain page's name. */
export type Route =
  | { readonly kind: 'board' }
  | { readonly kind: 'guarantee'; readonly id: string }
  | { readonly kind: PlainPage }
  | { readonly kind: 'nowhere'; readonly path: string };

function decoded(text: string): string | undefined {
  try {
    return decodeURIComponent(text);
  } catch {
    return undefined;
  }
}

export function routeOf(path: string): Route {
  if (path === '/') return { kind: 'board' };
  const plain = plainPages.find((name) => path === `/${name}`);
  if (plain !== undefined) return { kind: plain };
  const id = /^\/guarantees\/([^/]+)$/.exec(path)?.[1];
  const name = id === undefined ? undefined : decoded(id);
  return name === undefined ? { kind: 'nowhere', path } : { kind: 'guarantee', id: name };
}

export const guaranteePath = (id: string): string => `/guarantees/${encodeURIComponent(id)}`;

/** Pages that are shown without the plant around them, to whoever comes. */
export const isDoor = (route: Route): boolean => route.kind === 'sign-in' || route.kind === 'join' || route.kind === 'display';
