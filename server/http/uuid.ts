const pattern = /^[0-9a-f]{8}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{12}$/i;

/** True for the textual form of a UUID of any version. */
export function isUuid(value: unknown): value is string {
  return typeof value === 'string' && pattern.test(value);
}
