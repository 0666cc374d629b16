import { ArrayMaxSize, IsArray, IsIn, IsInt, IsOptional, IsString, Length, Matches, Max, MaxLength, Min } from 'class-validator';
import { STONE_COLOURS, STONE_FLAGS, STONE_SHAPES, type StoneColour, type StoneFlag, type StoneShape } from '@shared/api/evidence';
import type { NewStoneRequest, StoneChange, StoneStanding } from '@shared/api/kits';
import { SPECIES_IDS } from '@shared/gem';
import { IfSent } from '@/server/http/decorators';

const standings: readonly StoneStanding[] = ['in_kit', 'missing', 'damaged', 'different', 'retired'];
const slotRule = { message: 'Use one capital letter, A to Z.' };
const speciesRule = { message: 'Choose a species of the reference table.' };
/** A hundred million of the currency's smallest unit: more than any teaching stone, less than a slip can hurt. */
const maxValueMinor = 100_000_000;

export class NewStoneDto implements NewStoneRequest {
  @Matches(/^[A-Z]$/, slotRule)
  slot: string;

  @IsIn([...SPECIES_IDS], speciesRule)
  species: string;

  @IsOptional() @IsIn(STONE_COLOURS)
  colour?: StoneColour | null;

  @IsIn(STONE_SHAPES)
  shape: StoneShape;

  @IfSent() @IsString() @MaxLength(40)
  nominalSize?: string;

  @IsString() @Length(1, 200)
  neutralDescription: string;

  @IfSent() @IsString() @MaxLength(1000)
  marks?: string;

  @IfSent() @IsString() @MaxLength(500)
  source?: string;

  @IsInt() @Min(0) @Max(maxValueMinor)
  replacementValueMinor: number;

  @IfSent() @IsArray() @ArrayMaxSize(STONE_FLAGS.length) @IsIn(STONE_FLAGS, { each: true })
  flags?: StoneFlag[];
}

export class StoneChangeDto implements StoneChange {
  @IsInt() @Min(1)
  version: number;

  @IfSent() @IsIn(standings)
  standing?: StoneStanding;

  @IfSent() @Matches(/^[A-Z]$/, slotRule)
  slot?: string;

  @IfSent() @IsIn([...SPECIES_IDS], speciesRule)
  species?: string;

  @IsOptional() @IsIn(STONE_COLOURS)
  colour?: StoneColour | null;

  @IfSent() @IsIn(STONE_SHAPES)
  shape?: StoneShape;

  @IfSent() @IsString() @MaxLength(40)
  nominalSize?: string;

  @IfSent() @IsString() @Length(1, 200)
  neutralDescription?: string;

  @IfSent() @IsString() @MaxLength(1000)
  marks?: string;

  @IfSent() @IsString() @MaxLength(500)
  source?: string;

  @IfSent() @IsInt() @Min(0) @Max(maxValueMinor)
  replacementValueMinor?: number;

  @IfSent() @IsArray() @ArrayMaxSize(STONE_FLAGS.length) @IsIn(STONE_FLAGS, { each: true })
  flags?: StoneFlag[];
}
