const UUID = /^[0-9a-f]{8}(-[0-9a-f]{4}){3}-[0-9a-f]{12}$/;

/** Ids come in from addresses: what is no UUID names nothing. */
export const isId = (text: string): boolean => UUID.test(text);
