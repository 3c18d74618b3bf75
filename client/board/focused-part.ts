/** The element that has the focus, looked for through shadow roots; undefined when it is outside of `root`. */
export function focusedPart(root: ShadowRoot): HTMLElement | undefined {
  let at = root.activeElement;
  while (at?.shadowRoot?.activeElement) at = at.shadowRoot.activeElement;
  return at instanceof HTMLElement ? at : undefined;
}
