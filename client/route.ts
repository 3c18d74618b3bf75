/** The pages and their addresses: `/`, `/guarantees/:id`, `/alarms`. */
export type Route =
  | { readonly kind: 'board' }
  | { readonly kind: 'guarantee'; readonly id: string }
  | { readonly kind: 'alarms' }
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
  if (path === '/alarms') return { kind: 'alarms' };
  const id = /^\/guarantees\/([^/]+)$/.exec(path)?.[1];
  const name = id === undefined ? undefined : decoded(id);
  return name === undefined ? { kind: 'nowhere', path } : { kind: 'guarantee', id: name };
}

export const guaranteePath = (id: string): string => `/guarantees/${encodeURIComponent(id)}`;
