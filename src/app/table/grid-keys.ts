/** Where a key leads in the grid. Row -1 is the head. */
export interface Spot {
  readonly zone: 'head' | 'body';
  readonly column: number;
  /** Shown place, in the body. */
  readonly place: number;
}

export interface Extent {
  readonly columns: number;
  readonly places: number;
  readonly page: number;
}

/** Undefined when the key is none of the grid's. */
export function gridMove(event: Pick<KeyboardEvent, 'key' | 'ctrlKey'>, at: Spot, extent: Extent): Spot | undefined {
  const lastColumn = extent.columns - 1;
  const last = extent.places - 1;
  const body = (place: number): Spot => ({
    zone: 'body',
    column: at.column,
    place: Math.min(Math.max(place, 0), last),
  });
  switch (event.key) {
    case 'ArrowLeft':
      return { ...at, column: Math.max(0, at.column - 1) };
    case 'ArrowRight':
      return { ...at, column: Math.min(lastColumn, at.column + 1) };
    case 'ArrowDown':
      return at.zone === 'head' ? body(Math.max(at.place, 0)) : body(at.place + 1);
    case 'ArrowUp':
      if (at.zone === 'head') return at;
      return at.place <= 0 ? { ...at, zone: 'head' } : body(at.place - 1);
    case 'PageDown':
      return body(at.place + extent.page);
    case 'PageUp':
      return body(at.place - extent.page);
    case 'Home':
      return event.ctrlKey ? body(0) : { ...at, column: 0 };
    case 'End':
      return event.ctrlKey ? body(last) : { ...at, column: lastColumn };
    default:
      return undefined;
  }
}
