/** A page's filters by name, each with the value that is left out of the address. */
export type Filters = Record<string, string>;

/** The query of an address as vue-router gives it. */
export type AddressQuery = Record<string, string | null | (string | null)[] | undefined>;

const firstOf = (value: AddressQuery[string]): string | null =>
  Array.isArray(value) ? (value[0] ?? null) : (value ?? null);

/**
 * Filters as an address says them. What is missing takes its default; where `allowed` lists values, anything else does
 * too, so that an old or mistyped address still opens the page.
 */
export function filtersFromQuery<F extends Filters>(
  query: AddressQuery,
  defaults: F,
  allowed: { [K in keyof F]?: readonly string[] } = {},
): F {
  const entries = Object.entries(defaults).map(([name, byDefault]) => {
    const value = firstOf(query[name]);
    const known = allowed[name];
    return [name, value === null || (known && !known.includes(value)) ? byDefault : value];
  });
  return Object.fromEntries(entries) as F;
}

/** The query that says these filters: only what differs from its default; other parts of the address stay. */
export function queryFromFilters<F extends Filters>(filters: F, defaults: F, query: AddressQuery = {}): AddressQuery {
  const others = Object.entries(query).filter(([name]) => !Object.hasOwn(defaults, name));
  const own = Object.entries(filters).filter(([name, value]) => value !== defaults[name]);
  return Object.fromEntries([...others, ...own]);
}
