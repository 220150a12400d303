/**
 * Which rows stand in the window. Browsers cap an element's height (near 16 million px in some), so past
 * `TALLEST` the scroll bar is scaled and the wheel moves by rows itself.
 */
export const ROW_HEIGHT = 24;
export const HEAD_HEIGHT = 44;
const TALLEST = 6_000_000;
const SPARE = 6;

export class RowWindow {
  /** Rows in all. */
  count = $state(0);
  /** Height of the window without the head, px. */
  height = $state(0);
  /** Distance of the window's upper edge from the first row, px as if nothing were scaled. */
  top = $state(0);
  scrollTop = $state(0);

  total = $derived(this.count * ROW_HEIGHT);
  /** Height of the scrolled element. */
  spacer = $derived(Math.min(this.total, TALLEST));
  scaled = $derived(this.total > TALLEST);
  #ratio = $derived(this.scaled ? (this.total - this.height) / (this.spacer - this.height) : 1);

  first = $derived(Math.max(0, Math.floor(this.top / ROW_HEIGHT) - SPARE));
  last = $derived(Math.min(this.count, Math.ceil((this.top + this.height) / ROW_HEIGHT) + SPARE));
  /** Rows that are drawn at most. A row that scrolls out lends its place in the page to one that comes in. */
  slots = $derived(Math.ceil(this.height / ROW_HEIGHT) + 1 + 2 * SPARE);
  /**
   * Rows are laid out from this one on. It changes once in a windowful, so that scrolling moves only those rows that
   * come in.
   */
  base = $derived(this.first - (this.first % this.slots));
  /** Where the row `base` stands in the scrolled element. */
  offset = $derived(this.base * ROW_HEIGHT - this.top + this.scrollTop);

  scroller: HTMLElement | undefined;

  /** The scroll bar moved. */
  follow(scrollTop: number): void {
    const expected = this.top / this.#ratio;
    this.scrollTop = scrollTop;
    if (!this.scaled) this.top = scrollTop;
    // Our own moves come back rounded: only a real one counts.
    else if (Math.abs(scrollTop - expected) > 1) this.top = this.#clamp(scrollTop * this.#ratio);
  }

  moveTo(top: number): void {
    this.top = this.#clamp(top);
    const scrollTop = this.top / this.#ratio;
    if (!this.scroller) return;
    this.scroller.scrollTop = scrollTop;
    this.scrollTop = this.scroller.scrollTop;
    if (!this.scaled) this.top = this.scrollTop;
  }

  /** Into view with the least movement; a far one comes to the middle. */
  reveal(place: number): void {
    if (place < 0 || this.height <= 0) return;
    const y = place * ROW_HEIGHT;
    const far = y < this.top - this.height || y > this.top + 2 * this.height;
    if (far) this.moveTo(y - (this.height - ROW_HEIGHT) / 2);
    else if (y < this.top) this.moveTo(y);
    else if (y + ROW_HEIGHT > this.top + this.height) this.moveTo(y + ROW_HEIGHT - this.height);
  }

  get pageRows(): number {
    return Math.max(1, Math.floor(this.height / ROW_HEIGHT) - 1);
  }

  #clamp(top: number): number {
    return Math.min(Math.max(top, 0), Math.max(0, this.total - this.height));
  }
}
