import { Type } from 'class-transformer';
import { IsDefined, IsIn, IsInt, IsNumber, Matches, Max, Min, Validate, ValidateIf, ValidateNested, ValidatorConstraint, type ValidatorConstraintInterface } from 'class-validator';
import { IANAZone } from 'luxon';
import { IfSent, Words } from '@/server/http/decorators';
import type { NewTermsRequest, SchoolChange } from '@shared/api/school';

/** The largest amount the payment service takes in one payment: eight digits (docs.stripe.com/currencies). */
export const amountMinorMax = 99_999_999;

@ValidatorConstraint({ name: 'timeZone' })
class IsTimeZone implements ValidatorConstraintInterface {
  validate(value: unknown): boolean {
    return typeof value === 'string' && value.length <= 64 && IANAZone.isValidZone(value);
  }

  defaultMessage(): string {
    return 'Must be a time zone such as Europe/Dublin.';
  }
}

@ValidatorConstraint({ name: 'currency' })
class IsCurrency implements ValidatorConstraintInterface {
  validate(value: unknown): boolean {
    return typeof value === 'string' && Intl.supportedValuesOf('currency').includes(value);
  }

  defaultMessage(): string {
    return 'Must be a currency of ISO 4217 such as EUR.';
  }
}

export const isTimeZone = (value: string): boolean => new IsTimeZone().validate(value);
export const isCurrency = (value: string): boolean => new IsCurrency().validate(value);

const ofKind = (kind: DepositRuleBody['kind']) => ValidateIf((rule: DepositRuleBody) => rule.kind === kind);

/** Both kinds of rule in one class: which fields count is decided by `kind`, and the others are not kept. */
export class DepositRuleBody {
  @IsIn(['fixed', 'share'], { message: 'Must be fixed or share.' })
  kind!: 'fixed' | 'share';

  @ofKind('fixed')
  @IsInt()
  @Min(0)
  @Max(amountMinorMax)
  amountMinor!: number;

  @ofKind('share')
  @IsNumber({ maxDecimalPlaces: 2 })
  @Min(0)
  @Max(1000)
  percent!: number;

  @ofKind('share')
  @IsInt()
  @Min(0)
  @Max(amountMinorMax)
  minimumMinor!: number;

  @ValidateIf((rule: DepositRuleBody) => rule.kind === 'share' && rule.maximumMinor != null)
  @IsInt()
  @Min(0)
  @Max(amountMinorMax)
  maximumMinor?: number | null;
}

export class SchoolChangeBody implements SchoolChange {
  @IfSent()
  @Words(1, 120)
  name?: string;

  @IfSent()
  @Validate(IsTimeZone)
  timeZone?: string;

  @IfSent()
  @Validate(IsCurrency)
  currency?: string;

  @IfSent()
  @Matches(/^([01][0-9]|2[0-3]):[0-5][0-9]$/, { message: 'Must be a time of day such as 17:00.' })
  closingTime?: string;

  @IfSent()
  @IsInt()
  @Min(1)
  @Max(180)
  loanDays?: number;

  @IfSent()
  @IsDefined()
  @ValidateNested()
  @Type(() => DepositRuleBody)
  depositRule?: SchoolChange['depositRule'] & DepositRuleBody;

  @IfSent()
  @IsInt()
  @Min(0)
  @Max(720)
  lateGraceHours?: number;

  @IfSent()
  @IsInt()
  @Min(0)
  @Max(60)
  checkingDays?: number;

  /** At least as long as the payment page stays open. */
  @IfSent()
  @IsInt()
  @Min(30)
  @Max(1440)
  reservationMinutes?: number;

  @IfSent()
  @IsInt()
  @Min(1)
  @Max(180)
  objectionDays?: number;
}

export class NewTermsBody implements NewTermsRequest {
  @Words(1, 20_000)
  text!: string;
}
