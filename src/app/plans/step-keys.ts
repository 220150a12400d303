/** Moving the focus among the steps, by what each control is marked with. */
export type StepField = 'head' | 'cells' | 'expect';

/** Puts the focus on a control of this step once it is drawn. */
export function goTo(stepId: string, field: StepField): void {
  requestAnimationFrame(() => {
    const row = document.querySelector(`[data-step="${CSS.escape(stepId)}"]`);
    const control = row?.querySelector<HTMLElement>(`[data-field="${field}"]`);
    control?.focus();
    control?.scrollIntoView({ block: 'nearest' });
  });
}

/** The cell of the coil chart that an arrow key leads to from here; undefined = no arrow, or there is none. */
export function cellFrom(event: KeyboardEvent): HTMLElement | undefined {
  const from = (event.target as HTMLElement).closest<HTMLElement>('[data-cell]');
  const row = from?.closest('[data-step]');
  if (!from || !row) return undefined;
  const column = Number(from.dataset['cell']);
  const find = (within: Element | undefined, at: number): HTMLElement | undefined =>
    within?.querySelector<HTMLElement>(`[data-cell="${at}"]`) ?? undefined;
  if (event.key === 'ArrowLeft') return find(row, column - 1);
  if (event.key === 'ArrowRight') return find(row, column + 1);
  if (event.key !== 'ArrowUp' && event.key !== 'ArrowDown') return undefined;
  const rows = [...document.querySelectorAll('[data-step]')];
  return find(rows[rows.indexOf(row) + (event.key === 'ArrowUp' ? -1 : 1)], column);
}
