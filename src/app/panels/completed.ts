import { parseQuantity, unitsOf } from '../../base/units.ts';
import type { Setting } from '../../circuit/model.ts';
import type { SettingSpec } from '../../parts/contract.ts';

/** What was typed for a setting; a number alone takes the unit that stood there. */
export function completed(text: string, { value }: SettingSpec, shown: Setting): Setting {
  if (value.type === 'number') return Number.isFinite(Number(text)) ? Number(text) : text;
  if (value.type !== 'quantity' || parseQuantity(text, value.quantity).ok) return text;
  const unit = unitsOf(value.quantity).find((each) => each !== '' && String(shown).endsWith(` ${each}`));
  const guess = `${text} ${unit ?? ''}`.trim();
  return parseQuantity(guess, value.quantity).ok ? guess : text;
}
