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
