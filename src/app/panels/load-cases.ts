import { changeCircuit } from '../../circuit/edit.ts';
import type { Edit } from '../../circuit/edit.ts';
import { names } from '../../circuit/ids.ts';
import { withLoadCase } from '../../circuit/load-case.ts';
import type { Circuit, LoadCase, Part, Setting } from '../../circuit/model.ts';
import { kindOf } from '../../parts/catalogue.ts';
import { checkSettings } from '../../parts/settings.ts';
import type { SettingSpec } from '../../parts/contract.ts';

/** Settings that are a load: its size, and the way it acts. */
const LOADS: ReadonlySet<string> = new Set(['load', 'loadSense', 'work']);

/** The load settings of an actuator; empty for any other part. */
export const loadSpecs = (part: Part): readonly SettingSpec[] =>
  (kindOf(part.kind)?.settings ?? []).filter(({ id }) => LOADS.has(id));

const casesOf = (circuit: Circuit): readonly LoadCase[] => circuit.loadCases ?? [];

/** The last case takes the list with it, so that a circuit without cases is written as before. */
const put = (cases: readonly LoadCase[]): Edit => changeCircuit({ loadCases: cases.length > 0 ? cases : undefined });

const change = (circuit: Circuit, id: string, to: (entry: LoadCase) => LoadCase): Edit =>
  put(casesOf(circuit).map((entry) => (entry.id === id ? to(entry) : entry)));

/** A new case with the loads that stand now, those of case `from` or as drawn, of every actuator. */
export function addCase(circuit: Circuit, from?: string): { readonly edit: Edit; readonly id: string } {
  const cases = casesOf(circuit);
  const id = names(cases.map((entry) => entry.id)).fresh('case');
  const name = names(cases.map((entry) => entry.name)).fresh('Case ');
  const loads = Object.fromEntries(
    withLoadCase(circuit, from).parts.flatMap((part) => {
      const given = loadSpecs(part).filter(({ id, optional }) => !optional || part.settings?.[id] !== undefined);
      const set = given.map((spec) => [spec.id, part.settings?.[spec.id] ?? spec.value.default] as const);
      return set.length > 0 ? [[part.id, Object.fromEntries(set)]] : [];
    }),
  );
  return { edit: put([...cases, { id, name, loads }]), id };
}

export const renameCase = (circuit: Circuit, id: string, name: string): Edit =>
  change(circuit, id, (entry) => ({ ...entry, name }));

/** Why a case cannot have this name; undefined = it can. */
export function wrongName(circuit: Circuit, id: string, name: string): string | undefined {
  if (name === '') return 'A load case needs a name.';
  const taken = casesOf(circuit).some((entry) => entry.id !== id && entry.name === name);
  return taken ? 'Another load case has this name.' : undefined;
}

export const removeCase = (circuit: Circuit, id: string): Edit =>
  put(casesOf(circuit).filter((entry) => entry.id !== id));

/** Undefined = as the part itself says. */
export function setLoad(circuit: Circuit, id: string, part: string, setting: string, value: Setting | undefined): Edit {
  return change(circuit, id, (entry) => {
    const { [part]: before, ...others } = entry.loads;
    const { [setting]: _, ...rest } = before ?? {};
    const after = value === undefined ? rest : { ...rest, [setting]: value };
    return { ...entry, loads: Object.keys(after).length > 0 ? { ...others, [part]: after } : others };
  });
}

/** What is wrong with a value, in words; undefined = nothing. */
export function wrongLoad(part: Part, spec: SettingSpec, value: Setting): string | undefined {
  const [problem] = checkSettings({ ...part, settings: { [spec.id]: value } }, [spec]);
  return problem && `${problem.what} ${problem.remedy}`;
}

/** A load that would count as none, or a way without a load: said, not refused, since one is typed before the other. */
export function loadRemark(part: Part): string | undefined {
  const found = kindOf(part.kind)
    ?.check?.(part)
    .find(({ where, level }) => level === 'warning' && (where === 'settings.load' || where === 'settings.loadSense'));
  return found && `${found.what} ${found.remedy}`;
}
