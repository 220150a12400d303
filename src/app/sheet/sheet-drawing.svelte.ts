import type { Box, Point } from '../../base/points.ts';
import type { Primitive } from '../../base/primitives.ts';
import type { Circuit, Connection, Part } from '../../circuit/model.ts';
import type { Places } from '../../circuit/build.ts';
import type { Routes } from '../../drawing/geometry.ts';
import { placeMissing } from '../../drawing/place.ts';
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
import { figures } from '../state/figures.svelte.ts';
import { flowWays } from './flow-ways.ts';
import type { HitMap } from './hit.ts';
import { lineLook } from './looks.ts';
import { partStates } from './part-states.ts';
import type { PartState } from './part-states.ts';
import { pressureSpots } from './pressure-spots.ts';
import type { PressureSpot } from './pressure-spots.ts';
import { trueChevrons } from './chevrons.ts';
import { realFlows } from './real-flows.ts';
import type { RealFlow } from './real-flows.ts';
import { SheetRoutes } from './sheet-routes.ts';
import { sheetView } from './sheet-view.svelte.ts';
import { steadyList } from './steady.ts';

/** The circuit as it is drawn now: routes, looks and places, derived from the circuit and the row. */
class SheetDrawing {
  /** While parts are dragged: the circuit with them moved. */
  preview = $state.raw<Circuit | undefined>();

  #rest: Circuit = $derived(placeMissing(editor.circuit));
  /** With a place for every part that the file gives none. */
  circuit: Circuit = $derived(this.preview ? placeMissing(this.preview) : this.#rest);
  /** For edits that move parts which have no place of their own yet. */
  places: Places = $derived(new Map(this.circuit.parts.flatMap(({ id, at }) => (at ? [[id, at] as const] : []))));

  #layer = new SheetRoutes();
  routes: Routes = $derived(this.#layer.of(this.circuit, this.preview !== undefined));

  /** Of the circuit that the figures belong to. */
  assumed: Assumed = $derived(assumedIn(session.tabled));

  states: ReadonlyMap<string, PartState> = $derived.by(() => partStates(this.#rest, this.assumed));

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
  #steadyLabels = steadyList<SceneLabel>((label, i) => `${label.owner} ${i}`);

  scene: Scene = $derived.by(() => {
    const { circuit, routes, states } = this;
    const looks = new Map(
      circuit.connections.map(({ id }) => [id, lineLook(session.connectionLook(id), this.#ways.get(id))]),
    );
    const state: SceneState = {
      lines: looks,
      parts: states,
      hops: sheetView.hops,
      from: this.preview && { circuit: this.#rest, routes: this.#layer.settled },
    };
    const scene = buildScene(circuit, routes, state);
    return {
      ...scene,
      lines: this.#steadyLines(trueChevrons(scene.lines, routes, this.#flows)),
      parts: this.#steadyParts(scene.parts),
      labels: this.#steadyLabels(scene.labels),
    };
  });

  /** As they stand at rest: what they are called and what they are, not where they are dragged. */
  byId: ReadonlyMap<string, Part> = $derived(new Map(this.#rest.parts.map((part) => [part.id, part])));
  #connections = $derived(this.circuit.connections);
  connectionById: ReadonlyMap<string, Connection> = $derived(new Map(this.#connections.map((each) => [each.id, each])));

  /** Where the pressure of each line of the table is written; the same whatever the row. */
  #rooms = $derived(this.scene.labelRooms);
  pressureSpots: ReadonlyMap<number, PressureSpot> = $derived(
    this.preview ? new Map() : pressureSpots(this.circuit, this.routes, this.#rooms, session.table?.data.lines ?? []),
  );

  map: HitMap = $derived.by(() => ({
    parts: this.scene.parts.map((part) => ({ id: part.id, box: outline(part, this.byId.get(part.id)) })),
    ports: this.scene.parts.flatMap((part) =>
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
}

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

export const drawing = new SheetDrawing();
