import { IsBoolean, IsIn, IsInt, IsNumber, IsOptional, IsPositive, IsString, Length, Min } from 'class-validator';
import { INSTRUMENT_KINDS, type InstrumentChange, type InstrumentKind, type NewInstrumentRequest } from '@shared/api/instruments';
import { IfSent } from '@/server/http/decorators';

export class NewInstrumentDto implements NewInstrumentRequest {
  @IsIn(INSTRUMENT_KINDS)
  kind: InstrumentKind;

  @IsString() @Length(1, 80)
  name: string;

  @IsOptional() @IsNumber() @IsPositive()
  resolution?: number | null;

  @IsOptional() @IsNumber() @IsPositive()
  standardUncertainty?: number | null;

  @IsOptional() @IsNumber() @IsPositive()
  spotUncertainty?: number | null;

  @IsOptional() @IsNumber() @IsPositive()
  liquidLimitRi?: number | null;
}

export class InstrumentChangeDto implements InstrumentChange {
  @IsInt() @Min(1)
  version: number;

  @IfSent() @IsString() @Length(1, 80)
  name?: string;

  @IsOptional() @IsNumber() @IsPositive()
  resolution?: number | null;

  @IsOptional() @IsNumber() @IsPositive()
  standardUncertainty?: number | null;

  @IsOptional() @IsNumber() @IsPositive()
  spotUncertainty?: number | null;

  @IsOptional() @IsNumber() @IsPositive()
  liquidLimitRi?: number | null;

  @IfSent() @IsBoolean()
  retired?: boolean;
}
