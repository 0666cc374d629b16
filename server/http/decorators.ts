import { IsString, Length, ValidateIf } from 'class-validator';
import { Transform } from 'class-transformer';

/** The field may be left out; when it is sent, `null` included, its other rules hold. (`IsOptional` would let `null` through.) */
export function IfSent(): PropertyDecorator {
  return ValidateIf((_body: object, value: unknown) => value !== undefined);
}

/** Text without blanks around it, of `min` to `max` characters. */
export function Words(min: number, max: number): PropertyDecorator {
  const message = min > 0 ? `Must be ${min} to ${max} characters.` : `Must be at most ${max} characters.`;
  const rules = [Transform(trimmed), IsString({ message: 'Must be text.' }), Length(min, max, { message })];
  return (target, property) => {
    for (const rule of rules) rule(target, property);
  };
}

function trimmed({ value }: { value: unknown }): unknown {
  return typeof value === 'string' ? value.trim() : value;
}
