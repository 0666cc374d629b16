import { IsIn, IsInt, IsString, Length, Matches, MaxLength, Min } from 'class-validator';
import type { KitChange, KitPlace, KitStanding, NewKitRequest } from '@shared/api/kits';
import { IfSent } from '@/server/http/decorators';
import { PageQuery } from '@/server/http/paging';

const places: readonly KitPlace[] = ['shelf', 'incomplete', 'reserved', 'out', 'returned', 'checking', 'set_aside', 'retired'];
const standings: readonly KitStanding[] = ['lendable', 'set_aside', 'retired'];

export class KitListQuery extends PageQuery {
  /** Part of a number or title, or a label's whole code. */
  @IfSent() @IsString() @MaxLength(120)
  q?: string;

  @IfSent() @IsIn(places)
  place?: KitPlace;
}

export class NewKitDto implements NewKitRequest {
  @Matches(/^[0-9A-Z-]{1,12}$/, { message: 'Use 1 to 12 digits, capital letters or dashes, for instance 014.' })
  number: string;

  @IsString() @Length(1, 120)
  title: string;

  @IsString() @Length(1, 120)
  neutralTitle: string;
}

export class KitChangeDto implements KitChange {
  @IsInt() @Min(1)
  version: number;

  @IfSent() @IsString() @Length(1, 120)
  title?: string;

  @IfSent() @IsString() @Length(1, 120)
  neutralTitle?: string;

  @IfSent() @IsIn(standings)
  standing?: KitStanding;

  @IfSent() @IsString() @MaxLength(500)
  standingReason?: string;
}
