import fc from 'fast-check';
import type { Point } from '../../src/base/points.ts';
import type {
  Circuit,
  CircuitSheet,
  Connection,
  Extra,
  Label,
  Part,
  PartGroup,
  PortRef,
  ReadyMadeValve,
  LoadCase,
  RuleText,
  ValveData,
} from '../../src/circuit/model.ts';
import { PAPERS } from '../../src/circuit/paper.ts';
import { KNOWN_ENDS } from '../../src/circuit/plan-schema.ts';
import type { PlanStep, StepEnd, StepPlan } from '../../src/circuit/plan.ts';
import { KNOWN } from '../../src/circuit/schema.ts';

const RESERVED = /"(__proto__|constructor|prototype)":/;

export const id: fc.Arbitrary<string> = fc
  .stringMatching(/^[A-Za-z0-9_-]{1,8}$/)
  .filter((text) => text !== '__proto__');
/** Any text of one line: letters of all scripts, emoji, quotes, tags. */
export const words: fc.Arbitrary<string> = fc
  .oneof(
    fc.string({ unit: 'grapheme', minLength: 1, maxLength: 20 }),
    fc.constantFrom('<script>alert(1)</script>', 'Hubwerk ↑', 'Зажим', '夹紧', '"\\', 'ＡＢ', '👷🏽‍♀️', 'toString'),
  )
  .filter((text) => text.length <= 200 && !/[\u0000-\u001f\u007f-\u009f\u2028\u2029]/.test(text));

export const point: fc.Arbitrary<Point> = fc
  .record({ x: fc.integer({ min: -100_000, max: 100_000 }), y: fc.double({ min: -1000, max: 1000, noNaN: true }) })
  .map(({ x, y }) => ({ x, y: y + 0 }));

const unknownFields = (known: ReadonlySet<string>): fc.Arbitrary<Extra> =>
  fc
    .dictionary(
      fc.oneof(fc.constantFrom('weight', 'budget', 'x.y', '7', 'extra'), words),
      fc.jsonValue({ maxDepth: 3 }),
      {
        minKeys: 1,
        maxKeys: 3,
        noNullPrototype: true,
      },
    )
    // JSON has no -0, and a file refuses the reserved names.
    .map((fields) => JSON.parse(JSON.stringify(fields)) as Extra)
    .filter((fields) => Object.keys(fields).length > 0 && !Object.keys(fields).some((key) => known.has(key)))
    .filter((fields) => !RESERVED.test(JSON.stringify(fields)));

const named = fc.dictionary(
  words.filter((word) => !/^(__proto__|constructor|prototype)$/.test(word)),
  words,
  { maxKeys: 3, noNullPrototype: true },
);
const paths = fc.array(fc.constantFrom('P-A', 'P>A', 'A~T', 'B~>T', 'P-A-B'), { maxLength: 4 });
const operator = fc.constantFrom('lever', 'coil', 'spring', 'detent', 'hand', 'pilot');

const valve: fc.Arbitrary<ValveData> = fc.record(
  {
    ports: fc.array(
      fc.record(
        { id, side: fc.constantFrom('top', 'bottom'), extra: unknownFields(KNOWN.valvePort) },
        { requiredKeys: ['id', 'side'], noNullPrototype: true },
      ),
      { maxLength: 4 },
    ),
    positions: fc.array(
      fc.record(
        { name: words, paths, extra: unknownFields(KNOWN.valvePosition) },
        { requiredKeys: ['name', 'paths'], noNullPrototype: true },
      ),
      { maxLength: 3 },
    ),
    crossovers: fc.array(paths, { maxLength: 2 }),
    rest: fc.nat(3),
    left: fc.array(operator, { maxLength: 2 }),
    right: fc.array(operator, { maxLength: 2 }),
    coils: fc.array(
      fc.record(
        { name: words, position: fc.nat(3), extra: unknownFields(KNOWN.coil) },
        { requiredKeys: ['name', 'position'], noNullPrototype: true },
      ),
      { maxLength: 2 },
    ),
    extra: unknownFields(KNOWN.valve),
  },
  { requiredKeys: ['ports', 'positions', 'left', 'right'], noNullPrototype: true },
);

const settings = fc.dictionary(
  words.filter((word) => !/^(__proto__|constructor|prototype)$/.test(word)),
  fc.oneof(words, fc.boolean(), fc.integer(), fc.constant('30 L/min')),
  { maxKeys: 3, noNullPrototype: true },
);

/** Fields of a part besides id and label. */
export const partFields: fc.Arbitrary<Omit<Part, 'id' | 'label'>> = fc.record(
  {
    kind: fc.oneof(fc.constantFrom('tank', 'cylinder', 'directional-valve', 'junction'), words),
    code: words,
    at: point,
    turn: fc.constantFrom(0, 90, 180, 270),
    flip: fc.boolean(),
    settings,
    valve,
    extra: unknownFields(KNOWN.part),
  },
  { requiredKeys: ['kind'], noNullPrototype: true },
);

const port = (parts: readonly Part[]): fc.Arbitrary<PortRef> =>
  fc.record(
    { part: fc.constantFrom(...parts.map((part) => part.id)), port: fc.constantFrom('P', 'T', 'A', 'B') },
    { noNullPrototype: true },
  );

export const connectionFields: fc.Arbitrary<Omit<Connection, 'id' | 'from' | 'to'>> = fc.record(
  {
    name: words,
    use: fc.constantFrom('working', 'pilot', 'drain'),
    size: words,
    bends: fc.array(point, { maxLength: 3 }),
    extra: unknownFields(KNOWN.connection),
  },
  { requiredKeys: [], noNullPrototype: true },
);

const connection = (parts: readonly Part[]): fc.Arbitrary<Connection> =>
  fc
    .tuple(id, port(parts), port(parts), connectionFields)
    .filter(([, from, to]) => from.part !== to.part || from.port !== to.port)
    .map(([own, from, to, fields]) => ({ id: own, from, to, ...fields }));

const label: fc.Arbitrary<Label> = fc.record(
  { id, at: point, text: words, extra: unknownFields(KNOWN.label) },
  { requiredKeys: ['id', 'at', 'text'], noNullPrototype: true },
);

const sheet: fc.Arbitrary<CircuitSheet> = fc.record(
  { id, name: words, extra: unknownFields(KNOWN.sheet) },
  { requiredKeys: ['id', 'name'], noNullPrototype: true },
);

const group: fc.Arbitrary<PartGroup> = fc.record(
  { id, name: words, parts: fc.array(id, { maxLength: 3 }), extra: unknownFields(KNOWN.group) },
  { requiredKeys: ['id', 'name', 'parts'], noNullPrototype: true },
);

const readyMade: fc.Arbitrary<ReadyMadeValve> = fc.record(
  { id, title: words, kind: fc.constantFrom('pilot-valve'), valve, extra: unknownFields(KNOWN.readyMadeValve) },
  { requiredKeys: ['id', 'title', 'valve'], noNullPrototype: true },
);

const rule: fc.Arbitrary<RuleText> = fc.record(
  { id, text: words, extra: unknownFields(KNOWN.rule) },
  { requiredKeys: ['id', 'text'], noNullPrototype: true },
);

const loadCase: fc.Arbitrary<LoadCase> = fc.record(
  {
    id,
    name: words,
    loads: fc.dictionary(id, fc.dictionary(fc.constantFrom('load', 'loadSense'), words, { noNullPrototype: true }), {
      noNullPrototype: true,
    }),
    extra: unknownFields(KNOWN.loadCase),
  },
  { requiredKeys: ['id', 'name', 'loads'], noNullPrototype: true },
);

const placed = fc.constantFrom('in', 'out', '120 mm', 'half way');
const byPart = (value: fc.Arbitrary<string>): fc.Arbitrary<Record<string, string>> =>
  fc.dictionary(id, value, { maxKeys: 3, noNullPrototype: true });
const stepEnd: fc.Arbitrary<StepEnd> = fc
  .oneof(
    fc.constant({ by: 'motion' } as const),
    fc.record({ by: fc.constant('sensor' as const), actuator: id, at: placed }),
    fc.record({
      by: fc.constant('pressure' as const),
      switch: id,
      turns: fc.constantFrom('on' as const, 'off' as const),
    }),
    fc.record({ by: fc.constant('time' as const), after: fc.constantFrom('2 s', '500 ms') }),
  )
  .chain((end) =>
    fc
      .option(unknownFields(KNOWN_ENDS[end.by]), { nil: undefined })
      .map((extra) => ({ ...end, ...(extra && { extra }) })),
  );

const step: fc.Arbitrary<PlanStep> = fc.record(
  {
    id,
    name: words,
    coils: fc.array(
      fc.tuple(id, words).map(([part, name]) => `${part}.${name}`),
      { maxLength: 3 },
    ),
    levers: byPart(words),
    stopped: fc.array(id, { maxLength: 2 }),
    expect: fc.oneof(fc.constantFrom('A+', 'A+ B-'), words),
    ends: stepEnd,
    within: fc.constantFrom('20 s', '1 min'),
    extra: unknownFields(KNOWN.step),
  },
  { requiredKeys: ['id', 'ends'], noNullPrototype: true },
);

const plan: fc.Arbitrary<StepPlan> = fc.record(
  {
    id,
    name: words,
    start: byPart(placed),
    standing: byPart(words),
    loadCase: id,
    steps: fc.uniqueArray(step, { maxLength: 4, selector: (s) => s.id }),
    extra: unknownFields(KNOWN.plan),
  },
  { requiredKeys: ['id', 'name', 'steps'], noNullPrototype: true },
);

/** Any circuit that a file can hold, unknown fields at every level among it. */
export const anyCircuit: fc.Arbitrary<Circuit> = fc
  .uniqueArray(fc.tuple(id, partFields), { maxLength: 6, selector: ([own]) => own })
  .chain((found) => {
    const parts: readonly Part[] = found.map(([own, fields], i) => ({
      id: own,
      ...fields,
      // A label that no other part's id can be.
      ...(i % 2 === 1 && { label: `№ ${i}` }),
    }));
    return fc.record(
      {
        name: fc.oneof(words, fc.constant('')),
        title: named,
        paper: fc.constantFrom(...PAPERS),
        notes: words.map((text) => `${text}\n\t${text}`),
        parts: fc.constant(parts),
        connections:
          parts.length === 0
            ? fc.constant([])
            : fc.uniqueArray(connection(parts), { maxLength: 6, selector: (c) => c.id }),
        labels: fc.uniqueArray(label, { maxLength: 3, selector: (l) => l.id }),
        groups: fc.uniqueArray(group, { maxLength: 3, selector: (g) => g.id }),
        readyMadeValves: fc.uniqueArray(readyMade, { maxLength: 2, selector: (r) => r.id }),
        rules: fc.uniqueArray(rule, { maxLength: 3, selector: (r) => r.id }),
        loadCases: fc.uniqueArray(loadCase, { maxLength: 3, selector: (l) => l.id }),
        plans: fc.uniqueArray(plan, { maxLength: 2, selector: (p) => p.id }),
        extra: unknownFields(KNOWN.circuit),
      },
      { requiredKeys: ['name', 'parts', 'connections'], noNullPrototype: true },
    );
  })
  .chain((circuit) =>
    fc
      .option(fc.uniqueArray(sheet, { minLength: 1, maxLength: 3, selector: (s) => s.id }), { nil: undefined })
      .map((sheets) => (sheets ? spread(circuit, sheets) : circuit)),
  );

/** Parts and texts in turn on no sheet of their own, on the first, the second and so on. */
function spread(circuit: Circuit, sheets: readonly CircuitSheet[]): Circuit {
  const on = <T>(thing: T, i: number): T => {
    const id = sheets[(i % (sheets.length + 1)) - 1]?.id;
    return id === undefined ? thing : { ...thing, sheet: id };
  };
  return {
    ...circuit,
    sheets,
    parts: circuit.parts.map(on),
    ...(circuit.labels && { labels: circuit.labels.map(on) }),
  };
}
