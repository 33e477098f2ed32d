let last = 0n;

/**
 * UUID version 7 (RFC 9562 section 5.7) that never runs backwards on this device: the 74 random bits
 * are counted up when two are made in one millisecond, so that ids of one moment keep their order.
 */
export const uuidV7 = (now = Date.now()): string => {
  const random = crypto.getRandomValues(new Uint8Array(10));
  let bits = 0n;
  for (const byte of random) bits = (bits << 8n) | BigInt(byte);
  const fresh = (BigInt(now) << 74n) | (bits & ((1n << 73n) - 1n));
  last = fresh > last ? fresh : last + 1n;
  const time = (last >> 74n).toString(16).padStart(12, '0');
  const a = ((last >> 62n) & 0xfffn).toString(16).padStart(3, '0');
  const b = (0x8000000000000000n | (last & ((1n << 62n) - 1n))).toString(16);
  return `${time.slice(0, 8)}-${time.slice(8)}-7${a}-${b.slice(0, 4)}-${b.slice(4)}`;
};
