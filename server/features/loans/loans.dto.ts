import { Type } from 'class-transformer';
import { ArrayMaxSize, ArrayMinSize, IsArray, IsBoolean, IsIn, IsString, IsUUID, Length, MaxLength, ValidateNested } from 'class-validator';
import { Optional } from '@/server/http/optional';
import { PageQuery } from '@/server/http/paging';
import type {
  AcceptTermsRequest, BackState, CancelLoanRequest, LoanState, ObjectionRequest, ReturnLoanRequest, SeeJarRequest, StartLoanRequest,
} from '@shared/api/loans';
import { loanTransitions } from '@shared/lending';

const states = Object.keys(loanTransitions) as LoanState[];
const backStates: readonly BackState[] = ['seen', 'missing', 'damaged'];
/** A scanned link may be long; the label parser takes the code out of it. */
const scannedMax = 300;
const conditionMax = 300;

export class StartLoanDto implements StartLoanRequest {
  @Optional() @IsString() @MaxLength(scannedMax)
  code?: string;

  @Optional() @IsUUID()
  kitId?: string;

  @Optional() @IsUUID()
  borrowerId?: string;
}

export class SeeJarDto implements SeeJarRequest {
  @Optional() @IsString() @MaxLength(scannedMax)
  code?: string;

  @Optional() @IsUUID()
  stoneId?: string;

  @Optional() @IsString() @MaxLength(conditionMax)
  condition?: string;

  @Optional() @IsBoolean()
  absent?: boolean;
}

export class AcceptTermsDto implements AcceptTermsRequest {
  @IsUUID()
  termsVersionId: string;
}

export class CancelLoanDto implements CancelLoanRequest {
  @Optional() @IsString() @MaxLength(conditionMax)
  reason?: string;
}

export class ReturnedJarDto {
  @IsUUID()
  stoneId: string;

  @IsIn(backStates)
  state: BackState;

  @Optional() @IsString() @MaxLength(conditionMax)
  condition?: string;
}

export class ReturnLoanDto implements ReturnLoanRequest {
  @IsArray() @ArrayMinSize(1) @ArrayMaxSize(26) @ValidateNested({ each: true }) @Type(() => ReturnedJarDto)
  stones: ReturnedJarDto[];
}

export class ObjectionDto implements ObjectionRequest {
  @IsString() @Length(3, 4000)
  text: string;
}

export class StaffLoansQuery extends PageQuery {
  @Optional() @IsIn(states)
  state?: LoanState;

  @Optional() @IsUUID()
  borrowerId?: string;

  @Optional() @IsUUID()
  kitId?: string;
}
