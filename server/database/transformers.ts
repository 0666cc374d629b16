import type { ValueTransformer } from 'typeorm';

/** PostgreSQL `bigint` arrives as a string: whole minor units as a number, refused where a number would lose digits. */
export const minorUnits: ValueTransformer = {
  to: (value: number | null | undefined) => value,
  from: (value: string | null) => {
    if (value === null) return null;
    const number = Number(value);
    if (!Number.isSafeInteger(number)) throw new RangeError(`Amount ${value} is too large to be handled exactly.`);
    return number;
  },
};
