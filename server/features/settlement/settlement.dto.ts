import { Type } from 'class-transformer';
import { ArrayMaxSize, IsArray, IsInt, IsOptional, IsString, IsUUID, Length, Max, Min, ValidateNested } from 'class-validator';
import type { ObjectionAnswerRequest, SettlementRequest } from '@shared/api/settlement';

export class SettlementItemDto {
  @IsOptional() @IsUUID()
  stoneId?: string;

  @IsString() @Length(3, 500)
  reason: string;

  /** Whole minor units. */
  @IsInt() @Min(1) @Max(100_000_000)
  amountMinor: number;
}

export class SettlementDto implements SettlementRequest {
  @IsArray() @ArrayMaxSize(30) @ValidateNested({ each: true }) @Type(() => SettlementItemDto)
  items: SettlementItemDto[];
}

export class ObjectionAnswerDto implements ObjectionAnswerRequest {
  @IsString() @Length(3, 4000)
  answer: string;
}
