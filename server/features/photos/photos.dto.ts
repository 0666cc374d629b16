import { IsString, IsUUID, MaxLength } from 'class-validator';
import { IfSent } from '@/server/http/decorators';

/** The fields of the form beside the picture, which is sent as `photo`. */
export class PhotoFormDto {
  @IfSent() @IsString() @MaxLength(200)
  note?: string;

  /** The loan whose return the photo documents. */
  @IfSent() @IsUUID()
  loanId?: string;
}
