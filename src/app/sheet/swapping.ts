import { swapPart } from '../../circuit/insert.ts';
import { portSpecs } from '../../drawing/shapes.ts';
import { kindOf } from '../../parts/catalogue.ts';
import type { SettingSpec } from '../../parts/contract.ts';
import type { Setting } from '../../circuit/model.ts';
import { entryOf } from '../tray/entries.ts';
import { editor } from '../state/editor.svelte.ts';
import { attempt, tryTo } from './attempt.ts';
import { desk } from './desk.svelte.ts';
import { nameOf } from './hand.ts';

/** Whether a setting of one kind means the same in another. */
function fits(spec: SettingSpec, other: SettingSpec | undefined, value: Setting): boolean {
  const [a, b] = [spec.value, other?.value];
  if (!b || a.type !== b.type) return false;
  if (a.type === 'quantity' && b.type === 'quantity') return a.quantity === b.quantity;
  return b.type !== 'choice' || b.options.includes(String(value));
}

/** Makes of a part what was picked in the tray, and says what was lost. */
export function swapFor(id: string, readyId: string): void {
  const entry = entryOf(readyId);
  const part = editor.circuit.parts.find((each) => each.id === id);
  if (!entry || !part) return;
  const { kind, readyMade } = entry;
  const made = readyMade.make();
  const specs = kindOf(part.kind)?.settings ?? [];
  const keeps = new Set(
    specs
      .filter((spec) => {
        const value = part.settings?.[spec.id];
        return (
          value !== undefined &&
          fits(
            spec,
            kind.settings.find((each) => each.id === spec.id),
            value,
          )
        );
      })
      .map((spec) => spec.id),
  );
  const into = { kind: kind.kind, settings: made.settings, valve: made.valve, keeps };
  const ports = portSpecs({ id: '?', kind: kind.kind, ...made }).map((port) => port.id);
  const swapped = tryTo(() => swapPart(editor.circuit, id, { ...into, ports }));
  if (!swapped) return;
  const titleOf = (key: string): string => specs.find((spec) => spec.id === key)?.title ?? key;
  const lost = [
    ...(swapped.lostPorts.length > 0 ? [`lines at ${swapped.lostPorts.join(', ')}`] : []),
    ...swapped.lostSettings.map((key) => titleOf(key).toLowerCase()),
  ];
  const words = lost.length > 0 ? `Lost: ${lost.join('; ')}.` : 'Lines and settings were kept.';
  if (!attempt(() => swapped.edit, `${nameOf(id)} is now ${readyMade.title.toLowerCase()}. ${words}`)) return;
  editor.select({ parts: [id] });
  desk.cursor = { type: 'part', id };
}
