/** Share of a motion's power along gravity: squared cosine of the angle; undefined where gravity is unknown. */
export function verticalShare(
  direction: readonly number[],
  up: readonly number[] | undefined,
): number | undefined {
  if (!up || up.length !== direction.length) return undefined;
  const cosine = direction.reduce((sum, v, a) => sum + v * up[a]!, 0);
  return Math.min(1, cosine * cosine);
}
