import { route, schema } from '@/server/http/route';
import type { SchoolView, TermsVersionView, TermsView } from '@shared/api/school';
import { NewTermsBody, SchoolChangeBody } from './school.dto';
import { addTerms, changeSchool, readSchool, readTerms } from './school.service';

export const schoolRoutes = [
  route({
    method: 'get', path: '/school', permission: 'school:read', summary: 'The current school and its lending rules',
    response: schema<SchoolView>('SchoolView'), idempotent: false,
    handle: ({ tx, actor }) => readSchool(tx, actor.schoolId),
  }),
  route({
    method: 'patch', path: '/school', permission: 'school:write', summary: 'Change settings; what is left out stays',
    request: SchoolChangeBody, response: schema<SchoolView>('SchoolView'), idempotent: false,
    handle: ({ tx, actor, body }) => changeSchool(tx, actor, body),
  }),
  route({
    method: 'get', path: '/school/terms', permission: 'school:read', summary: 'The terms of lending, present and past',
    response: schema<TermsView>('TermsView'), idempotent: false,
    handle: ({ tx, actor }) => readTerms(tx, actor.schoolId),
  }),
  route({
    method: 'post', path: '/school/terms', permission: 'school:write', summary: 'Add a version of the terms',
    request: NewTermsBody, response: schema<TermsVersionView>('TermsVersionView'), status: 201, idempotent: true,
    handle: ({ tx, actor, body, now }) => addTerms(tx, actor, body.text, now),
  }),
];
