export const sayError = (error: unknown): string => (error instanceof Error ? error.message : String(error));

const LONG = 10n ** 12n;
const RAISED = '⁰¹²³⁴⁵⁶⁷⁸⁹';

/** `3,486,784,401`; beyond a million million `1.2 · 10¹⁹`. */
export function sayCount(count: bigint): string {
  if (count < LONG) return count.toLocaleString('en');
  const digits = count.toString();
  const power = [...String(digits.length - 1)].map((digit) => RAISED[Number(digit)]).join('');
  return `about ${digits.slice(0, 1)}.${digits.slice(1, 2)} · 10${power}`;
}
