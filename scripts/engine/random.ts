/** A small generator with a seed, so that every fault can be made again: xorshift of 32 bits. */
export interface Random {
  /** 0 up to, not including, n */
  below(n: number): number;
}

export function randomOf(seed: number): Random {
  let state = (Math.imul(seed + 1, 0x9e3779b1) ^ 0x5bd1e995) | 0 || 1;
  const next = () => {
    state ^= state << 13;
    state ^= state >>> 17;
    state ^= state << 5;
    return state >>> 0;
  };
  for (let i = 0; i < 8; i += 1) next();
  return { below: (n) => Math.floor((next() / 2 ** 32) * n) };
}
