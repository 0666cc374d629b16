import { Transform } from 'class-transformer';
import { IsEmail, IsString, MaxLength, MinLength } from 'class-validator';
import type { NewPasswordRequest, PasswordResetRequest, SignInRequest } from '@shared/api/sessions';
import { passwordMaxLength } from './passwords';

/** Addresses are kept and compared in lower case, without the blanks that phones add. */
export function asAddress({ value }: { value: unknown }): unknown {
  return typeof value === 'string' ? value.trim().toLowerCase() : value;
}

export class SignInBody implements SignInRequest {
  /** Not checked for form: an ill-formed address is simply one that nobody has. */
  @Transform(asAddress)
  @IsString()
  @MinLength(1)
  @MaxLength(254)
  email!: string;

  @IsString()
  @MinLength(1)
  @MaxLength(passwordMaxLength)
  password!: string;
}

export class PasswordResetBody implements PasswordResetRequest {
  @Transform(asAddress)
  @IsEmail({ allow_utf8_local_part: false }, { message: 'Must be an e-mail address.' })
  @MaxLength(254)
  email!: string;
}

export class NewPasswordBody implements NewPasswordRequest {
  @IsString()
  @MaxLength(passwordMaxLength)
  password!: string;
}
