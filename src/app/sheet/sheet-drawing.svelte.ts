import type { Box, Point } from '../../base/points.ts';
import type { Primitive } from '../../base/primitives.ts';
import type { Circuit, Connection, Part } from '../../circuit/model.ts';
import type { Places } from '../../circuit/build.ts';
import type { Routes } from '../../drawing/geometry.ts';
import { faceOf, referencesOf, withZones } from '../../drawing/faces.ts';
import type { ZoneOf } from '../../drawing/faces.ts';
import { placeMissing } from '../../drawing/place.ts';
import { isReference, referenceId } from '../../drawing/reference-symbol.ts';
import type { References } from '../../drawing/references.ts';
import { laidScene, movesOf, sketchRoutes } from '../../drawing/moving.ts';
import type { Laid, Moves } from '../../drawing/moving.ts';
import { routeAll } from '../../drawing/routing.ts';
import { buildScene } from '../../drawing/scene.ts';
import type { Scene, SceneLine, ScenePart, SceneState } from '../../drawing/scene.ts';
import { labelBox } from '../../drawing/labels.ts';
import type { SceneLabel } from '../../drawing/labels.ts';
import { placePrimitives } from '../../drawing/turned.ts';
import { kindOf } from '../../parts/catalogue.ts';
import { editor } from '../state/editor.svelte.ts';
import { session } from '../state/session.svelte.ts';
import { assumedIn } from '../state/assumed.ts';
import type { Assumed } from '../state/assumed.ts';
import { headings } from '../state/headings.ts';
import { figures } from '../state/figures.svelte.ts';
import { within } from './culling.ts';
import { flowWays } from './flow-ways.ts';
import { heldItems, heldOf } from './held.ts';
import type { Held } from './held.ts';
import type { HitMap } from './hit.ts';
import { lineLook } from './looks.ts';
import { partStates } from './part-states.ts';
import type { PartState } from './part-states.ts';
import { plane } from './plane.svelte.ts';
import { pressureSpots } from './pressure-spots.ts';
import type { PressureSpot } from './pressure-spots.ts';
import { trueChevrons } from './chevrons.ts';
import { realFlows } from './real-flows.ts';
import type { RealFlow } from './real-flows.ts';
import { SheetRoutes } from './sheet-routes.ts';
import { shownSheet } from './sheet-shown.svelte.ts';
import { sheetView } from './sheet-view.svelte.ts';
import { steadyList } from './steady.ts';
import { zoneAt } from './zones.ts';

/** One sheet with the places of the pressures at its lines. */
export interface SheetPicture {
  readonly scene: Scene;
  readonly pressureSpots: ReadonlyMap<number, PressureSpot>;
}

/** The circuit as it is drawn now: routes, looks and places, derived from the circuit and the row. */
class SheetDrawing {
  #preview = $state.raw<Circuit | undefined>();
  // While something is dragged, all that stands still is left alone: nothing that it is drawn from may be derived from
  // where the hand is. So these are set, and only when they change.
  #held = $state.raw<Held | undefined>();
  /** More changed than something that moved: all of it is drawn anew. */
  #upset = $state.raw(false);

  /** While parts are dragged: the circuit with them moved. */
  get preview(): Circuit | undefined {
    return this.#preview;
  }

  set preview(circuit: Circuit | undefined) {
    if (circuit === this.#preview) return;
    this.#preview = circuit;
    this.#held = heldOf(this.#moves, this.#held);
    this.#upset = circuit !== undefined && this.#moves === undefined;
  }

  #whole: Circuit = $derived(placeMissing(editor.circuit));
  /** With a place for every part that the file gives none; the parts of all sheets. */
  circuit: Circuit = $derived(this.preview ? placeMissing(this.preview) : this.#whole);
  /** Where lines go on on other sheets, at rest. */
  references: References = $derived(referencesOf(this.#whole));
  #rest: Circuit = $derived(faceOf(this.#whole, shownSheet.now, this.references, zoneOn));
  /** What the sheet in view shows, as a circuit of its own: the whole one where there is but one sheet. */
  face: Circuit = $derived(
    this.preview
      ? faceOf(this.circuit, shownSheet.now, referencesOf(this.circuit, this.references), zoneOn)
      : this.#rest,
  );
  /** For edits that move parts which have no place of their own yet. */
  places: Places = $derived(new Map(this.#whole.parts.flatMap(({ id, at }) => (at ? [[id, at] as const] : []))));

  readonly #layers = new Map<string, SheetRoutes>();
  /** Counts searches that ended after their frame. */
  #laid = $state(0);
  #settled: Routes = $derived.by(() => {
    void this.#laid;
    return this.#layerOf(shownSheet.now).of(this.#rest);
  });

  #moves: Moves | undefined = $derived(this.preview && movesOf(this.#rest, this.face));
  routes: Routes = $derived.by(() => {
    if (!this.preview) return this.#settled;
    return this.#moves ? sketchRoutes(this.#rest, this.#settled, this.face, this.#moves) : routeAll(this.face);
  });

  /** Of the circuit that the figures belong to. */
  assumed: Assumed = $derived(assumedIn(session.tabled));

  states: ReadonlyMap<string, PartState> = $derived.by(() => partStates(this.#whole, this.assumed));

  /** Where flows are computed they have the last word. */
  #flows: ReadonlyMap<string, RealFlow> = $derived.by(() => {
    const { answer, table } = session;
    const numbers = figures.current;
    if (!answer || !table || numbers?.status !== 'solved') return new Map();
    return realFlows(answer.circuit, table, numbers);
  });

  #ways = $derived.by(() => {
    const ways = flowWays(editor.circuit, (part) => session.positionOf(part), session.conditions.pumps === 'running');
    // Marks are laid all along these, and then turned or left out one by one.
    for (const id of this.#flows.keys()) ways.set(id, 'forward');
    return ways;
  });

  #steadyLines = steadyList<SceneLine>((line) => line.connection);
  #steadyParts = steadyList<ScenePart>((part) => part.id);
  #steadyLabels = steadyList<SceneLabel>((label) => labelKey(label));

  #state: SceneState = $derived({
    lines: new Map(
      editor.circuit.connections.map(({ id }) => [id, lineLook(session.connectionLook(id), this.#ways.get(id))]),
    ),
    parts: this.states,
    hops: sheetView.hops,
  });

  /** The drawing at rest: while something is dragged, as it was before. */
  scene: Scene = $derived.by(() => {
    const [circuit, routes] = this.#upset ? [this.face, this.routes] : [this.#rest, this.#settled];
    const scene = buildScene(circuit, routes, this.#state);
    return {
      ...scene,
      lines: this.#steadyLines(trueChevrons(scene.lines, routes, this.#flows)),
      parts: this.#steadyParts(scene.parts),
      labels: this.#steadyLabels(keyed(scene.labels)),
    };
  });

  /** What of the drawing stands still, as far as it is near what is in view. */
  still: Laid = $derived.by(() => {
    const { scene } = this;
    const held = this.#held;
    return within(plane.region, held ? heldItems(scene, held, false) : scene);
  });

  /** What goes along with the hand as it is; `shift` says how far. */
  carried: Laid | undefined = $derived.by(() => {
    const held = this.#held;
    return held && heldItems(this.scene, held, true);
  });
  shift: Point = $derived(this.#moves?.by ?? { x: 0, y: 0 });
  /** Something is on its way. */
  get dragging(): boolean {
    return this.#held !== undefined || this.#upset;
  }

  /** Whether a part goes along with the hand. */
  carries(part: string): boolean {
    return this.#held?.parts.has(part) ?? false;
  }

  /** What the hand draws anew as it goes. */
  laid: Laid | undefined = $derived.by(() => {
    const moves = this.#moves;
    if (!moves) return undefined;
    const laid = laidScene(this.#rest, this.face, this.routes, moves, this.#state);
    return { ...laid, labels: keyed(laid.labels), lines: trueChevrons(laid.lines, this.routes, this.#flows) };
  });

  /** As they stand at rest: what they are called and what they are, not where they are dragged. */
  byId: ReadonlyMap<string, Part> = $derived(new Map(this.#whole.parts.map((part) => [part.id, part])));
  connectionById: ReadonlyMap<string, Connection> = $derived(
    new Map(this.#whole.connections.map((each) => [each.id, each])),
  );
  /** `part.port` → a connection there. */
  connectionAt: ReadonlyMap<string, string> = $derived(
    new Map(
      this.#whole.connections.flatMap(({ id, from, to }) =>
        [from, to].map((ref) => [`${ref.part}.${ref.port}`, id] as const),
      ),
    ),
  );
  enclosures: ReadonlyMap<string, readonly Primitive[]> = $derived(
    new Map(this.scene.enclosures.map(({ part, primitives }) => [part, primitives])),
  );
  headings: ReadonlyMap<string, number> = $derived(headings(this.#whole));

  /** Where the pressure of each line of the table is written; the same whatever the row. */
  #rooms = $derived(this.scene.labelRooms);
  pressureSpots: ReadonlyMap<number, PressureSpot> = $derived(
    pressureSpots(this.#rest, this.#settled, this.#rooms, session.table?.data.lines ?? []),
  );

  #layerOf(sheet: string): SheetRoutes {
    const known = this.#layers.get(sheet);
    if (known) return known;
    const layer = new SheetRoutes({
      run: (step) => requestAnimationFrame(step),
      now: () => performance.now(),
      done: () => (this.#laid += 1),
    });
    this.#layers.set(sheet, layer);
    return layer;
  }

  /** One sheet as it would stand in the row on show, or at rest without marks, whether it is in view or not. */
  sheet(id: string, how: 'row' | 'plain'): SheetPicture {
    const circuit = faceOf(this.#whole, id, this.references, zoneOn);
    const routes = this.#layerOf(id).finished(circuit);
    if (how === 'plain')
      return { scene: buildScene(circuit, routes, { hops: sheetView.hops }), pressureSpots: new Map() };
    const scene = buildScene(circuit, routes, this.#state);
    return {
      scene: { ...scene, lines: trueChevrons(scene.lines, routes, this.#flows) },
      pressureSpots: pressureSpots(circuit, routes, scene.labelRooms, session.table?.data.lines ?? []),
    };
  }

  /** Whether a connection leads to another sheet. */
  crosses(connection: string): boolean {
    return this.references.has(referenceId(connection, 'from'));
  }

  /** The scene of a sheet with its references named by other zones. */
  zoned(scene: Scene, zoneOf: ZoneOf): Scene {
    return withZones(scene, this.#whole, this.references, zoneOf);
  }

  #ownParts = $derived(this.scene.parts.filter((part) => !isReference(part)));

  /** At rest, too. */
  map: HitMap = $derived.by(() => ({
    parts: this.#ownParts.map((part) => ({ id: part.id, box: outline(part, this.byId.get(part.id)) })),
    references: this.scene.parts.filter(isReference).map(({ id, box }) => ({ id, box })),
    ports: this.#ownParts.flatMap((part) =>
      part.ports.map(({ ref, at, side, role }) => ({
        part: ref.part,
        port: ref.port,
        at,
        side,
        joint: role === 'joint',
      })),
    ),
    routes: this.scene.lines.map(({ connection, points }) => ({ id: connection, points })),
    labels: this.scene.labels
      .filter(({ role }) => role === 'free')
      .map((label) => ({ id: label.owner, box: labelBox(label) })),
  }));
  /** Part id → outline, at rest. */
  boxes: ReadonlyMap<string, Box> = $derived(new Map(this.map.parts.map(({ id, box }) => [id, box])));
}

const zoneOn: ZoneOf = (_, at) => zoneAt(at);

/** A valve's outline goes along with its boxes. */
function outline({ box, placement, primitives }: ScenePart, part: Part | undefined): Box {
  const now = stripShift(primitives);
  if (!now || !part) return box;
  const rest = stripShift(placePrimitives(kindOf(part.kind)?.draw(part, {}) ?? [], placement)) ?? now;
  return { ...box, x: box.x + now.x - rest.x, y: box.y + now.y - rest.y };
}

const stripShift = (primitives: readonly Primitive[]): Point | undefined => {
  const strip = primitives.find((p) => p.type === 'group' && p.role === 'strip');
  return strip?.type === 'group' ? strip.shift : undefined;
};

const keys = new WeakMap<SceneLabel, string>();
/** What a label is known by, whatever others there are. */
export const labelKey = (label: SceneLabel): string => keys.get(label) ?? label.owner;

/** Names of one owner stand in lines below one another. */
function keyed(labels: readonly SceneLabel[]): readonly SceneLabel[] {
  const counts = new Map<string, number>();
  for (const label of labels) {
    const of = `${label.role} ${label.owner}`;
    const count = counts.get(of) ?? 0;
    counts.set(of, count + 1);
    keys.set(label, `${of} ${count}`);
  }
  return labels;
}

export const drawing = new SheetDrawing();
