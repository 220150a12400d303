/** What has the keyboard, seen as a thing: within a sheet or a table it is what they point at. */
function inHand(): Element | undefined {
  const active = document.activeElement;
  if (!active || active === document.body || !active.matches(':focus-visible')) return undefined;
  const within = active.getAttribute('aria-activedescendant');
  return (within === null ? null : document.getElementById(within)) ?? active;
}

/** Whether this panel hides all of what has the keyboard (WCAG 2.2, 2.4.11). */
export function hidesFocus(panel: Element): boolean {
  const thing = inHand();
  if (!thing || panel.contains(document.activeElement)) return false;
  const [over, under] = [panel.getBoundingClientRect(), thing.getBoundingClientRect()];
  return under.left >= over.left && under.right <= over.right && under.top >= over.top && under.bottom <= over.bottom;
}
