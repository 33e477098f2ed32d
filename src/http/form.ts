/** The text fields of a posted form; files are never posted here. Unknown fields are simply not asked for. */
export const readForm = async (request: Request): Promise<ReadonlyMap<string, string>> => {
  const form = await request.formData();
  const fields = new Map<string, string>();
  for (const [name, value] of form.entries()) {
    if (typeof value === 'string') fields.set(name, value);
  }
  return fields;
};

/** A path of this site to go to afterwards, or the fallback: never another site's address. */
export const safePath = (path: string | null | undefined, fallback: string): string =>
  path !== null && path !== undefined && /^\/(?![/\\])[\w\-./?=&%:~+,]*$/.test(path)
    ? path
    : fallback;
