/** The id of a new act: UUID version 7 (RFC 9562 section 5.7), made here so that sending twice is one act. */
export const newAct = (): string => {
  const bytes = crypto.getRandomValues(new Uint8Array(16));
  const time = Date.now().toString(16).padStart(12, '0');
  const random = [...bytes].map((byte) => byte.toString(16).padStart(2, '0')).join('');
  const variant = (8 + ((bytes[8] ?? 0) % 4)).toString(16);
  return [
    time.slice(0, 8),
    time.slice(8),
    `7${random.slice(0, 3)}`,
    `${variant}${random.slice(3, 6)}`,
    random.slice(6, 18),
  ].join('-');
};
