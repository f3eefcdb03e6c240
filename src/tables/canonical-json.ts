/**
 * JSON with object keys sorted at every depth, so that equal values give equal text.
 *
 * Keys whose value is `undefined` are left out, as in JSON. Numbers that JSON cannot hold are refused
 * rather than turned into `null`.
 *
 * @throws RangeError on NaN and infinities.
 */
export function canonicalJson(value: unknown): string {
  if (typeof value === 'number' && !Number.isFinite(value))
    throw new RangeError(`canonicalJson: ${value} has no JSON form`);
  if (Array.isArray(value)) return `[${value.map((item) => canonicalJson(item ?? null)).join(',')}]`;
  if (value !== null && typeof value === 'object') {
    const entries = Object.entries(value)
      .filter(([, item]) => item !== undefined)
      .sort(([a], [b]) => (a < b ? -1 : a > b ? 1 : 0));
    return `{${entries.map(([key, item]) => `${JSON.stringify(key)}:${canonicalJson(item)}`).join(',')}}`;
  }
  return JSON.stringify(value);
}
