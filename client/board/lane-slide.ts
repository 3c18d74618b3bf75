/** Tops of the lanes by id, px on the page; taken before the board is drawn anew. */
export function laneTops(list: Element): ReadonlyMap<string, number> {
  const tops = new Map<string, number>();
  for (const item of list.querySelectorAll<HTMLElement>('[data-id]')) {
    tops.set(item.dataset['id'] ?? '', item.offsetTop);
  }
  return tops;
}

/** Lets each lane that moved slide from where it stood to where it stands; at once for those who asked for less motion. */
export function slideLanes(list: Element, before: ReadonlyMap<string, number>): void {
  if (matchMedia('(prefers-reduced-motion: reduce)').matches) return;
  for (const item of list.querySelectorAll<HTMLElement>('[data-id]')) {
    const stood = before.get(item.dataset['id'] ?? '');
    if (stood === undefined || Math.abs(stood - item.offsetTop) < 1) continue;
    item.animate([{ transform: `translateY(${stood - item.offsetTop}px)` }, { transform: 'none' }], {
      duration: 450,
      easing: 'cubic-bezier(0.2, 0.7, 0.2, 1)',
    });
  }
}
