/** How large a circuit file may be, and how its words are spelt. Reading, edits and forms share these. */
export const LIMITS = {
  /** Characters of the file. */
  text: 20_000_000,
  parts: 10_000,
  connections: 40_000,
  labels: 10_000,
  rules: 1_000,
  loadCases: 100,
  plans: 100,
  /** Steps of one plan. */
  steps: 500,
  /** Coils, levers or pumps named in one step, and actuators or valves named before the first. */
  named: 1_000,
  /** Bend points of one connection. */
  bends: 1_000,
  /** Blocks drawn round parts. */
  groups: 1_000,
  sheets: 200,
  /** Valves of the circuit's own make. */
  readyMadeValves: 200,
  /** Circuits in one file of them, and in the tray. */
  readyMadeCircuits: 60,
  /** Modules from the sheet's origin. */
  coordinate: 100_000,
  id: 100,
  /** Characters of a name, label, code or setting. */
  label: 200,
  notes: 100_000,
  /** Characters of a rule. */
  rule: 1_000,
  /** Objects and lists inside one another. */
  depth: 64,
  /** Problems told at once; the rest is counted. */
  problems: 50,
} as const;

/** Ids of parts, ports, connections and labels. */
export const ID = /^[A-Za-z0-9_-]+$/;
export const PORT_REF = /^[A-Za-z0-9_-]+\.[A-Za-z0-9_-]+$/;

/** Part id and coil name, which may be any word. */
export const COIL_REF = /^[A-Za-z0-9_-]+\.[^\u0000-\u001f\u007f-\u009f\u2028\u2029]+$/;

/** C0 and C1 control characters and the two Unicode line breaks: nothing that one line of text can hold. */
export const ONE_LINE = /^[^\u0000-\u001f\u007f-\u009f\u2028\u2029]*$/;
/** Notes may hold tabs and line breaks. */
export const SEVERAL_LINES = /^[^\u0000-\u0008\u000b\u000c\u000e-\u001f\u007f-\u009f]*$/;

/** Names that would reach an object's machinery instead of its data. */
export const RESERVED: ReadonlySet<string> = new Set(['__proto__', 'constructor', 'prototype']);

export const ID_REMEDY = 'Use letters, digits, - and _ only, at most 100 of them.';
export const isId = (text: string): boolean => text.length <= LIMITS.id && ID.test(text) && !RESERVED.has(text);
export const isOneLine = (text: string): boolean => text.length <= LIMITS.label && ONE_LINE.test(text);
