/** Where a call goes: the contract's path with its parameters filled in, and what is asked for. */
export interface CalledAddress {
  path: string;
  params?: Record<string, string>;
  query?: Record<string, unknown>;
}

/** The address of a call at an origin (empty for our own); what is undefined is left out of the query. */
export function callUrl(origin: string, { path, params = {}, query = {} }: CalledAddress): string {
  const filled = path.replace(/:([A-Za-z0-9]+)/g, (_, name: string) => encodeURIComponent(params[name] ?? ''));
  const asked = Object.entries(query)
    .filter(([, value]) => value !== undefined)
    .map(([name, value]) => `${encodeURIComponent(name)}=${encodeURIComponent(String(value))}`)
    .join('&');
  return `${origin}${filled}${asked ? `?${asked}` : ''}`;
}
