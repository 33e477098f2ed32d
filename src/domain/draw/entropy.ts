/** In how many ways `count` can be chosen from `pool`, exactly. */
const combinations = (pool: number, count: number): bigint => {
  let ways = 1n;
  for (let i = 1; i <= count; i++) ways = (ways * BigInt(pool - count + i)) / BigInt(i);
  return ways;
};

/** RFC 3797 section 3.3: whole bits of randomness needed so that every choice can come out. */
export const bitsNeeded = (pool: number, count: number): number => {
  const ways = combinations(pool, count);
  let bits = 0;
  while (1n << BigInt(bits) < ways) bits++;
  return bits;
};
