import { ValidateIf } from 'class-validator';

/**
 * A field that may be left out. Unlike class-validator's `IsOptional`, null is not taken for "left out": it is checked,
 * and refused unless the field's other rules allow it.
 */
export function Optional(): PropertyDecorator {
  return ValidateIf((_target, value) => value !== undefined);
}
