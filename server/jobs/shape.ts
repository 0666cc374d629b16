/** Reads one value of a payload; throws a `PoisonedPayload` that names what it wanted when the value is not that. */
export type Reader<T> = (value: unknown, name: string) => T;

/** A payload that no handler can work with. Trying again cannot help, so the runner gives up on the job at once. */
export class PoisonedPayload extends Error {
  override readonly name = 'PoisonedPayload';
}

const UUID = /^[0-9a-f]{8}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{12}$/i;

export const uuid: Reader<string> = (value, name) => {
  if (typeof value === 'string' && UUID.test(value)) return value;
  throw new PoisonedPayload(`${name} should be a uuid`);
};

/** Text of 1 to 255 characters: ids of other services, machine words. */
export const text: Reader<string> = (value, name) => {
  if (typeof value === 'string' && value.length >= 1 && value.length <= 255) return value;
  throw new PoisonedPayload(`${name} should be text of 1 to 255 characters`);
};

export function orNull<T>(read: Reader<T>): Reader<T | null> {
  return (value, name) => (value === null ? null : read(value, name));
}

export type Shape<Fields> = { readonly [Key in keyof Fields]: Reader<Fields[Key]> };
export type PayloadOf<S> = S extends (value: unknown) => infer Payload ? Payload : never;

/** Builds the reader of a whole payload. Fields that are not listed are dropped. */
export function shape<Fields extends Record<string, unknown>>(fields: Shape<Fields>): (value: unknown) => Fields {
  return (value) => {
    if (typeof value !== 'object' || value === null) throw new PoisonedPayload('the payload should be an object');
    const given = new Map<string, unknown>(Object.entries(value));
    const read: Partial<Fields> = {};
    for (const key in fields) read[key] = fields[key](given.get(key), key);
    return read as Fields;
  };
}
