/** Mixed radix: how far one step of each input moves the row; the last input is the fastest. */
export function strides(radices: readonly number[]): number[] {
  const out = new Array<number>(radices.length);
  let stride = 1;
  for (let i = radices.length - 1; i >= 0; i--) {
    out[i] = stride;
    stride *= radices[i] as number;
  }
  return out;
}

/**
 * Number of a row in the order in which each row differs from the one before by one step of one input, as
 * in a reflected code; a pressure solve that starts from such a neighbour takes the fewest iterations.
 */
export function reflectedRank(row: number, radices: readonly number[], weights: readonly number[]): number {
  let rank = 0;
  let ahead = 0;
  for (let i = 0; i < radices.length; i++) {
    const radix = radices[i] as number;
    const digit = Math.floor(row / (weights[i] as number)) % radix;
    // What follows runs backwards behind every second number.
    const place = ahead % 2 === 1 ? radix - 1 - digit : digit;
    rank += place * (weights[i] as number);
    ahead = ahead * radix + place;
  }
  return rank;
}
