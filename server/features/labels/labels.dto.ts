import { ArrayMaxSize, ArrayMinSize, IsArray, IsBoolean, IsIn, IsInt, IsUUID, Max, Min } from 'class-validator';
import { SHEET_PAGES, SHEET_SIZES, type IssueLabelsRequest, type LabelSheetRequest, type SheetPage, type SheetSize } from '@shared/api/labels';
import { IfSent } from '@/server/http/decorators';

export class IssueLabelsDto implements IssueLabelsRequest {
  @IsUUID()
  kitId: string;

  @IfSent() @IsArray() @ArrayMaxSize(26) @IsUUID(undefined, { each: true })
  stoneIds?: string[];

  @IfSent() @IsBoolean()
  includeKit?: boolean;
}

export class LabelSheetDto implements LabelSheetRequest {
  @IsArray() @ArrayMinSize(1) @ArrayMaxSize(50) @IsUUID(undefined, { each: true })
  kitIds: string[];

  @IsIn(SHEET_PAGES)
  page: SheetPage;

  @IsIn(SHEET_SIZES)
  size: SheetSize;

  @IsInt() @Min(1) @Max(200)
  startAt: number;
}
