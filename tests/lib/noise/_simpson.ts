/** Integral of `f` over the logarithm of its argument by Simpson's rule on a dense even grid. */
export function simpsonOverOffsets(
  f: (offset: number) => number,
  { from, to, panels = 20000 }: { from: number; to: number; panels?: number },
): number {
  const start = Math.log(from);
  const step = (Math.log(to) - start) / (2 * panels);
  let sum = 0;
  for (let i = 0; i <= 2 * panels; i++) {
    const offset = Math.min(to, Math.max(from, Math.exp(start + i * step)));
    const weight = i === 0 || i === 2 * panels ? 1 : i % 2 === 1 ? 4 : 2;
    sum += weight * f(offset) * offset;
  }
  return sum * step / 3;
}
