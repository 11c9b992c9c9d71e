/** Repeatable chance for the practice rig: 32-bit xorshift (Marsaglia 2003), and normal values by Box and Muller 1958. */
export interface Chance {
  /** 0 <= value < 1. */
  uniform(): number;
  /** Mean 0, standard deviation 1. */
  normal(): number;
  /** Mean 1. */
  exponential(): number;
}

export function seededChance(seed: number): Chance {
  let state = (Math.imul(seed + 1, 0x9e3779b1) ^ 0x6d2b79f5) >>> 0 || 1;
  let spare: number | undefined;
  const uniform = (): number => {
    state ^= state << 13;
    state ^= state >>> 17;
    state ^= state << 5;
    state >>>= 0;
    return state / 4_294_967_296;
  };
  for (let i = 0; i < 8; i += 1) uniform();
  return {
    uniform,
    normal() {
      if (spare !== undefined) {
        const value = spare;
        spare = undefined;
        return value;
      }
      const radius = Math.sqrt(-2 * Math.log(1 - uniform()));
      const angle = 2 * Math.PI * uniform();
      spare = radius * Math.sin(angle);
      return radius * Math.cos(angle);
    },
    exponential: () => -Math.log(1 - uniform()),
  };
}
