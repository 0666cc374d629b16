import { Type } from 'class-transformer';
import { ArrayMaxSize, ArrayMinSize, IsArray, IsIn, IsString, IsUUID, Length, MaxLength, ValidateNested } from 'class-validator';
import type { AcceptStoneRequest, BenchJarRequest, BenchReadingsRequest, EndStoneRequest, OpenBenchRequest } from '@shared/api/bench';
import type { BackState } from '@shared/api/loans';
import { ReadingEntryDto } from '@/server/features/stones/readingEntry.dto';
import { Optional } from '@/server/http/optional';

export class OpenBenchDto implements OpenBenchRequest {
  @IsString() @Length(1, 300)
  code: string;
}

/** One of `code` (scanned or typed) and `stoneId` (picked from the list). */
export class BenchJarDto implements BenchJarRequest {
  @Optional() @IsString() @Length(1, 300)
  code?: string;

  @Optional() @IsUUID()
  stoneId?: string;

  @IsIn(['seen', 'missing', 'damaged'])
  state: BackState;

  @Optional() @IsString() @MaxLength(300)
  condition?: string;
}

export class BenchReadingsDto implements BenchReadingsRequest {
  @IsArray() @ArrayMinSize(1) @ArrayMaxSize(30) @ValidateNested({ each: true }) @Type(() => ReadingEntryDto)
  readings: ReadingEntryDto[];
}

export class AcceptStoneDto implements AcceptStoneRequest {
  @IsString() @Length(3, 500)
  reason: string;
}

export class EndStoneDto implements EndStoneRequest {
  @IsIn(['missing', 'damaged', 'mixed_up'])
  ending: 'missing' | 'damaged' | 'mixed_up';

  @IsString() @Length(3, 500)
  reason: string;
}
