const SAFE = new Set(['GET', 'HEAD', 'OPTIONS']);

/**
 * Whether a write comes from another site's page. A browser always says where it comes from
 * (`Origin`, `Sec-Fetch-Site`); a request that carries cookies but says nothing is refused too.
 */
export const crossSite = (request: Request, publicUrl: string): boolean => {
  if (SAFE.has(request.method)) return false;
  const origin = request.headers.get('origin');
  if (origin !== null) return origin !== publicUrl;
  const site = request.headers.get('sec-fetch-site');
  if (site !== null) return site !== 'same-origin';
  return request.headers.has('cookie');
};
