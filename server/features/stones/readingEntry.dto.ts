import { Type } from 'class-transformer';
import { ArrayMaxSize, ArrayMinSize, IsArray, IsBoolean, IsIn, IsNumber, IsString, IsUUID, MaxLength, MinLength, ValidateNested } from 'class-validator';
import { ATTRIBUTES, CATEGORY_VALUES, type Attribute, type CategoryValue } from '@shared/api/evidence';
import type { IntakeReadingsRequest, ReadingEntry, StrikeRequest } from '@shared/api/kits';
import { IfSent } from '@/server/http/decorators';

/** One reading as entered, at intake and at the bench. What fits its attribute and instrument is checked by `toReadingRow`. */
export class ReadingEntryDto implements ReadingEntry {
  @IsIn(ATTRIBUTES)
  attribute: Attribute;

  @IfSent() @IsNumber()
  value?: number;

  @IfSent() @IsIn([...new Set(Object.values(CATEGORY_VALUES).flat())])
  category?: CategoryValue;

  @IfSent() @IsBoolean()
  overLimit?: boolean;

  @IfSent() @IsNumber()
  airCt?: number;

  @IfSent() @IsNumber()
  waterCt?: number;

  @IfSent() @IsNumber()
  waterC?: number;

  @IfSent() @IsUUID()
  instrumentId?: string;

  @IfSent() @IsString() @MaxLength(300)
  note?: string;
}

export class IntakeReadingsDto implements IntakeReadingsRequest {
  @IsArray() @ArrayMinSize(1) @ArrayMaxSize(60) @ValidateNested({ each: true }) @Type(() => ReadingEntryDto)
  readings: ReadingEntryDto[];
}

export class StrikeDto implements StrikeRequest {
  @IsString() @MinLength(3) @MaxLength(300)
  reason: string;
}
