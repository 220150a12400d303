import { parseQuantity, unitsOf } from '../../base/units.ts';

/** What was typed; a number alone takes the unit of what stood there, else seconds or millimetres. */
export function withUnit(text: string, quantity: 'length' | 'time', before: string): string {
  if (text === '' || parseQuantity(text, quantity).ok) return text;
  const unit = unitsOf(quantity).find((each) => each !== '' && before.endsWith(` ${each}`));
  const guess = `${text} ${unit ?? (quantity === 'time' ? 's' : 'mm')}`;
  return parseQuantity(guess, quantity).ok ? guess : text;
}
