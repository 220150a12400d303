import type { Circuit, Connection, Part, PortRef, Setting } from '../src/circuit/model.ts';
import { kindOf, readyMadeOf } from '../src/parts/catalogue.ts';
import type { PartKind } from '../src/parts/contract.ts';

/**
 * A circuit in one line, for tests:
 *
 * `P1 fixed-pump{flow=20 L/min}, T1 tank, V1 directional-valve:valve-4/3-shut, C1 cylinder | P1.P V1.P | LIFT: V1.A C1.A`
 *
 * Before the first bar stand the parts: id, kind, `:` and a ready-made form, settings in braces with `;` between
 * them. After each bar stands one line: its ports, connected as a chain, with its name before a colon if it has one.
 * A ready-made valve moved by a lever may be called `…-lever` where the catalogue leaves this word out.
 * `more` adds fields to parts by id, such as a valve of one's own. Throws at anything the catalogue does not know.
 */
export function circuit(notation: string, more: Readonly<Record<string, Partial<Omit<Part, 'id'>>>> = {}): Circuit {
  const [first = '', ...groups] = notation.split('|').map((group) => group.trim());
  const parts = new Map<string, Part>();
  for (const text of splitParts(first)) {
    const part = readPart(text, more);
    if (parts.has(part.id)) throw wrong(text, `the id ${part.id} is taken`);
    parts.set(part.id, part);
  }
  for (const id of Object.keys(more)) if (!parts.has(id)) throw wrong(id, 'fields for a part that is not there');
  const connections: Connection[] = [];
  for (const group of groups) readLine(group, parts, connections);
  return { name: 'Test', parts: [...parts.values()], connections };
}

const wrong = (text: string, why: string): Error => new Error(`Circuit notation, at "${text}": ${why}.`);

/** At the commas outside braces. */
const splitParts = (text: string): string[] =>
  text === '' ? [] : text.split(/,(?![^{]*\})/).map((part) => part.trim());

function readPart(text: string, more: Readonly<Record<string, Partial<Omit<Part, 'id'>>>>): Part {
  const match = /^([\w-]+)\s+([a-z-]+)(?::([^\s{]+))?\s*(?:\{([^{}]*)\})?$/.exec(text);
  if (!match) throw wrong(text, 'a part is written "id kind:form{setting=value;setting=value}"');
  const [, id = '', name = '', form, settingsText] = match;
  const kind = kindOf(name);
  if (kind === undefined) throw wrong(text, `there is no part kind "${name}"`);
  const base = formOf(text, kind, form);
  const settings: Record<string, Setting> = { ...base.settings };
  for (const one of settingsText === undefined ? [] : settingsText.split(';')) {
    const [key = '', value] = one.split(/=(.*)/s).map((half) => half.trim());
    if (value === undefined || value === '') throw wrong(text, `a setting is written "name=value", not "${one}"`);
    settings[key] = readSetting(text, kind, key, value);
  }
  const part = { id, kind: name, ...base };
  return { ...part, ...(Object.keys(settings).length > 0 && { settings }), ...more[id] };
}

function formOf(text: string, kind: PartKind, form: string | undefined): Pick<Part, 'settings' | 'valve'> {
  if (form === undefined) return kind.readyMade[0]?.make() ?? {};
  const entry = readyMadeOf(form) ?? readyMadeOf(form.replace(/-lever$/, ''));
  if (entry?.kind !== kind) {
    throw wrong(text, `${kind.kind} has no form "${form}"; it has ${kind.readyMade.map((r) => r.id).join(', ')}`);
  }
  return entry.readyMade.make();
}

function readSetting(text: string, kind: PartKind, key: string, value: string): Setting {
  const spec = kind.settings.find((setting) => setting.id === key);
  if (spec === undefined) {
    throw wrong(text, `${kind.kind} has no setting "${key}"; it has ${kind.settings.map((s) => s.id).join(', ')}`);
  }
  switch (spec.value.type) {
    case 'switch':
      if (value !== 'true' && value !== 'false') throw wrong(text, `${key} is true or false`);
      return value === 'true';
    case 'number':
      if (!Number.isFinite(Number(value))) throw wrong(text, `${key} is a number`);
      return Number(value);
    case 'choice':
      if (!spec.value.options.includes(value)) throw wrong(text, `${key} is one of ${spec.value.options.join(', ')}`);
      return value;
    case 'quantity':
    case 'actuator':
      return value;
  }
}

function readLine(group: string, parts: ReadonlyMap<string, Part>, connections: Connection[]): void {
  const match = /^(?:([^:]+?)\s*[:=])?\s*([^:=]*)$/.exec(group);
  if (!match) throw wrong(group, 'a line is written "NAME: part.port part.port"');
  const [, name, rest = ''] = match;
  const ports = rest
    .split(/\s+/)
    .filter((word) => word !== '')
    .map((word) => readPort(word, parts));
  if (ports.length < 2) throw wrong(group, 'a line needs two ports or more');
  const said = new Set(ports.map((ref) => `${ref.part}.${ref.port}`));
  if (said.size < ports.length) throw wrong(group, 'a port stands in it twice');
  for (const [i, to] of ports.slice(1).entries()) {
    connections.push({
      id: `c${connections.length + 1}`,
      from: ports[i] as PortRef,
      to,
      ...(i === 0 && name !== undefined && { name }),
    });
  }
}

function readPort(word: string, parts: ReadonlyMap<string, Part>): PortRef {
  const [id = '', port = ''] = word.split('.');
  const part = parts.get(id);
  if (part === undefined) throw wrong(word, `there is no part ${id}`);
  const ports =
    kindOf(part.kind)
      ?.ports(part)
      .map((spec) => spec.id) ?? [];
  if (!ports.includes(port)) throw wrong(word, `${id} has no port "${port}"; it has ${ports.join(', ')}`);
  return { part: id, port };
}
