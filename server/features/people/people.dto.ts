import { Transform } from 'class-transformer';
import { ArrayMaxSize, ArrayMinSize, ArrayUnique, IsArray, IsEmail, IsIn, IsOptional, IsString, MaxLength } from 'class-validator';
import { Words } from '@/server/http/decorators';
import { PageQuery } from '@/server/http/paging';
import { passwordMaxLength } from '@/server/features/sessions/passwords';
import { asAddress } from '@/server/features/sessions/sessions.dto';
import type { AcceptInvitationRequest, ChangeRolesRequest, InviteRequest } from '@shared/api/people';
import { roles, type Role } from '@shared/permissions';

const roleWords = roles.join(', ');

function Roles(): PropertyDecorator {
  const rules = [
    IsIn(roles, { each: true, message: `Must be among ${roleWords}.` }),
    ArrayUnique({ message: 'Name each role once.' }),
    ArrayMaxSize(roles.length, { message: 'Name each role once.' }),
    ArrayMinSize(1, { message: 'Choose at least one role.' }),
    IsArray({ message: 'Must be a list of roles.' }),
  ];
  return (target, property) => {
    for (const rule of rules) rule(target, property);
  };
}

export class InviteBody implements InviteRequest {
  @Transform(asAddress)
  @IsEmail({ allow_utf8_local_part: false }, { message: 'Must be an e-mail address.' })
  @MaxLength(254)
  email!: string;

  @IsOptional()
  @Words(0, 120)
  name?: string;

  @Roles()
  roles!: Role[];
}

export class ChangeRolesBody implements ChangeRolesRequest {
  @Roles()
  roles!: Role[];
}

export class AcceptInvitationBody implements AcceptInvitationRequest {
  @Words(1, 120)
  name!: string;

  @IsString()
  @MaxLength(passwordMaxLength)
  password!: string;
}

export class PeopleQuery extends PageQuery {
  @IsOptional()
  @IsIn(roles, { message: `Must be one of ${roleWords}.` })
  role?: Role;

  /** Part of a name or an address. */
  @IsOptional()
  @IsString()
  @MaxLength(100)
  search?: string;
}
