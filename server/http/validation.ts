import { plainToInstance } from 'class-transformer';
import { validate, type ValidationError } from 'class-validator';
import { Invalid, type FieldError } from './problem';
import type { DtoClass } from './route';
import { unstorableValues } from './text';

/**
 * Turns a parsed body or query into its DTO. Throws `Invalid` naming each wrong field; a field that the DTO does not
 * know is refused rather than ignored, because a misspelt field would otherwise be a setting silently lost.
 */
export async function validated<T extends object>(dto: DtoClass<T>, plain: unknown): Promise<T> {
  refuseUnstorable(plain);
  if (typeof plain !== 'object' || plain === null || Array.isArray(plain)) {
    throw new Invalid([{ field: '', message: 'Send one JSON object.' }]);
  }
  const instance = plainToInstance(dto, plain, { enableImplicitConversion: false, exposeDefaultValues: true });
  const faults = await validate(instance, {
    whitelist: true,
    forbidNonWhitelisted: true,
    forbidUnknownValues: false,
    stopAtFirstError: true,
    validationError: { target: true, value: false },
  });
  if (faults.length > 0) throw new Invalid(faults.flatMap((fault) => fieldErrors(fault, '')).slice(0, 50));
  return instance;
}

/** Throws `Invalid` for values that no route could store: see `text.ts`. */
export function refuseUnstorable(plain: unknown): void {
  const errors = unstorableValues(plain);
  if (errors.length > 0) throw new Invalid(errors);
}

function fieldErrors(fault: ValidationError, parent: string): FieldError[] {
  const inList = Array.isArray(fault.target);
  const field = inList ? `${parent}[${fault.property}]` : parent === '' ? fault.property : `${parent}.${fault.property}`;
  const own = Object.entries(fault.constraints ?? {}).map(([rule, message]) => ({ field, message: words(rule, message, fault.property) }));
  return [...own, ...(fault.children ?? []).flatMap((child) => fieldErrors(child, field))];
}

/** class-validator's messages begin with the property's name, which the client shows beside the field anyway. */
function words(rule: string, message: string, property: string): string {
  if (rule === 'whitelistValidation') return 'This field is not known here. Leave it out.';
  const text = message.startsWith(`${property} `) ? message.slice(property.length + 1) : message;
  return text.charAt(0).toUpperCase() + text.slice(1);
}
