import type { Point } from '../base/points.ts';
import { omit } from './fields.ts';
import { isId, LIMITS } from './limits.ts';
import { labelOf, sayPort, type Circuit, type Connection, type Label, type Part } from './model.ts';
import { RefusedEdit } from './refused.ts';

interface Item {
  readonly id: string;
}

/**
 * A circuit while edits are applied to it: lists are copied once, at the first change, and ids are looked up, so that
 * a paste of thousands of parts does not search all of them for each. Every method refuses what does not fit.
 */
export class Draft {
  readonly parts: DraftList<Part>;
  readonly connections: DraftList<Connection>;
  #labels: DraftList<Label> | undefined;
  #sheet: Circuit;
  /** Part ids by shown name. */
  #shown: Map<string, string> | undefined;
  /** How many connection ends stand at each part. */
  #ends: Map<string, number> | undefined;

  constructor(circuit: Circuit) {
    this.#sheet = circuit;
    this.parts = new DraftList('part', LIMITS.parts, circuit.parts);
    this.connections = new DraftList('connection', LIMITS.connections, circuit.connections);
    this.#labels = circuit.labels && new DraftList('label', LIMITS.labels, circuit.labels);
  }

  /** Lists that were not changed are those of the circuit before. */
  done(): Circuit {
    this.#checkSheets();
    const circuit = { ...this.#sheet, parts: this.parts.items, connections: this.connections.items };
    return this.#labels === undefined ? omit(circuit, 'labels') : { ...circuit, labels: this.#labels.items };
  }

  get sheet(): Circuit {
    return this.#sheet;
  }

  set sheet(sheet: Circuit) {
    this.#sheet = sheet;
  }

  get labels(): DraftList<Label> | undefined {
    return this.#labels;
  }

  /** The list of labels, begun if there is none. */
  beginLabels(): DraftList<Label> {
    return (this.#labels ??= new DraftList('label', LIMITS.labels, []));
  }

  dropLabels(): void {
    this.#labels = undefined;
  }

  putPart(index: number, part: Part): void {
    this.#checkShown(part);
    checkPoints(part.id, [part.at]);
    this.parts.put(index, part);
    this.#names().set(labelOf(part), part.id);
  }

  removePart(id: string): { index: number; part: Part } {
    const index = this.parts.indexOf(id);
    if ((this.#counts().get(id) ?? 0) > 0) {
      const held = this.connections.items.find((c) => c.from.part === id || c.to.part === id);
      throw new RefusedEdit(
        id,
        `The connection "${held?.id}" still ends at this part.`,
        'Remove its connections first.',
      );
    }
    const part = this.parts.remove(index);
    this.#names().delete(labelOf(part));
    return { index, part };
  }

  changePart(index: number, before: Part, after: Part): void {
    checkPoints(before.id, [after.at]);
    if (labelOf(after) !== labelOf(before)) {
      this.#checkShown(after);
      this.#names().delete(labelOf(before));
      this.#names().set(labelOf(after), after.id);
    }
    this.parts.change(index, after);
  }

  putConnection(index: number, connection: Connection): void {
    this.#checkEnds(connection);
    checkPoints(connection.id, connection.bends);
    this.connections.put(index, connection);
    this.#count(connection, 1);
  }

  removeConnection(index: number): Connection {
    const connection = this.connections.remove(index);
    this.#count(connection, -1);
    return connection;
  }

  changeConnection(index: number, before: Connection, after: Connection): void {
    this.#checkEnds(after);
    checkPoints(before.id, after.bends);
    this.#count(before, -1);
    this.#count(after, 1);
    this.connections.change(index, after);
  }

  /** At the end, as a sheet may go before the parts on it do. */
  #checkSheets(): void {
    const known = new Set(this.#sheet.sheets?.map(({ id }) => id));
    if (this.#sheet.sheets !== undefined && known.size < Math.max(1, this.#sheet.sheets.length))
      throw new RefusedEdit('sheets', 'Sheets need ids of their own, and there is one at least.', 'Add a sheet first.');
    for (const thing of [...this.parts.items, ...(this.#labels?.items ?? [])]) {
      if (thing.sheet === undefined || known.has(thing.sheet)) continue;
      throw new RefusedEdit(thing.id, `There is no sheet "${thing.sheet}".`, 'It may have been deleted before.');
    }
  }

  #names(): Map<string, string> {
    return (this.#shown ??= new Map(this.parts.items.map((part) => [labelOf(part), part.id])));
  }

  #counts(): Map<string, number> {
    if (this.#ends === undefined) {
      this.#ends = new Map();
      for (const connection of this.connections.items) this.#count(connection, 1);
    }
    return this.#ends;
  }

  #count({ from, to }: Connection, by: number): void {
    // Nobody has asked yet: they are counted when somebody does.
    if (this.#ends === undefined) return;
    for (const { part } of [from, to]) this.#ends.set(part, (this.#ends.get(part) ?? 0) + by);
  }

  #checkShown(part: Part): void {
    const shown = labelOf(part);
    const other = this.#names().get(shown);
    if (other === undefined || other === part.id) return;
    throw new RefusedEdit(part.id, `The part ${other} is shown as "${shown}" already.`, 'Choose another label.');
  }

  #checkEnds({ id, from, to }: Connection): void {
    for (const end of [from, to]) {
      if (this.parts.has(end.part)) continue;
      throw new RefusedEdit(id, `There is no part "${end.part}".`, 'Connect ports of parts that are there.');
    }
    if (from.part !== to.part || from.port !== to.port) return;
    throw new RefusedEdit(id, `The connection would go from ${sayPort(from)} to itself.`, 'Choose another port.');
  }
}

export class DraftList<T extends Item> {
  readonly #noun: string;
  readonly #most: number;
  readonly #before: readonly T[];
  #own: T[] | undefined;
  #ids: Set<string> | undefined;

  constructor(noun: string, most: number, items: readonly T[]) {
    this.#noun = noun;
    this.#most = most;
    this.#before = items;
  }

  get items(): readonly T[] {
    return this.#own ?? this.#before;
  }

  has(id: string): boolean {
    return (this.#ids ??= new Set(this.items.map((item) => item.id))).has(id);
  }

  indexOf(id: string): number {
    const index = this.items.findIndex((item) => item.id === id);
    if (index >= 0) return index;
    throw new RefusedEdit(id, `There is no ${this.#noun} "${id}".`, 'It may have been removed before.');
  }

  at(index: number): T {
    return this.items[index] as T;
  }

  put(index: number, item: T): void {
    const { id } = item;
    const noun = this.#noun;
    const { length } = this.items;
    if (!isId(id)) throw new RefusedEdit(id, `"${id}" is no ${noun} id.`, 'Use letters, digits, - and _ only.');
    if (this.has(id)) throw new RefusedEdit(id, `There is a ${noun} "${id}" already.`, 'Give it another id.');
    if (!Number.isInteger(index) || index < 0 || index > length) {
      throw new RefusedEdit(
        id,
        `There is no place ${index} in a list of ${length}.`,
        'Put it at the end or before one that is there.',
      );
    }
    if (length >= this.#most) {
      throw new RefusedEdit(
        'circuit',
        `The circuit has ${length} ${noun}s, and a file holds no more.`,
        'Start a second circuit.',
      );
    }
    this.#mine().splice(index, 0, item);
    this.#ids?.add(id);
  }

  remove(index: number): T {
    const item = this.at(index);
    this.#mine().splice(index, 1);
    this.#ids?.delete(item.id);
    return item;
  }

  change(index: number, item: T): void {
    this.#mine()[index] = item;
  }

  #mine(): T[] {
    return (this.#own ??= [...this.#before]);
  }
}

/** What is refused here is what could not be read from a file again. */
export function checkPoints(id: string, points: readonly (Point | undefined)[] = []): void {
  const fits = (n: number): boolean => Math.abs(n) <= LIMITS.coordinate;
  if (points.every((p) => p === undefined || (fits(p.x) && fits(p.y)))) return;
  throw new RefusedEdit(id, 'This place lies off the sheet.', `Stay within ${LIMITS.coordinate} modules.`);
}
