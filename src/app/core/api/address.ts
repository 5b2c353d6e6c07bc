import type { Endpoint, ParamsOf, QueryOf } from '#shared/contracts/endpoint';

/** The address of an endpoint: for links to files and pictures, and for the client itself. */
export function address<E extends Endpoint>(
  endpoint: E,
  params?: ParamsOf<E> | object,
  query?: QueryOf<E> | object,
): string {
  const values = new Map(Object.entries(params ?? {}));
  const path = endpoint.path.replace(/:([A-Za-z]+)/g, (_, name: string) => {
    const value: unknown = values.get(name);
    if (typeof value !== 'string' || value === '') {
      throw new Error(`"${name}" is missing for ${endpoint.path}`);
    }
    return encodeURIComponent(value);
  });
  const search = new URLSearchParams();
  for (const [name, value] of Object.entries(query ?? {})) {
    if (value !== undefined && value !== null) search.set(name, String(value));
  }
  const text = search.toString();
  return text === '' ? path : `${path}?${text}`;
}
