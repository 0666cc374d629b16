import { PageQuery } from '@/server/http/paging';
import { nothing, route, schema } from '@/server/http/route';
import type { Page } from '@shared/api/common';
import type { InvitationOffer, InvitationView, PersonView } from '@shared/api/people';
import { accept, readOffer } from './acceptance.service';
import { invite, listInvitations, withdraw } from './invitations.service';
import { AcceptInvitationBody, ChangeRolesBody, InviteBody, PeopleQuery } from './people.dto';
import { changeRoles, endMembership, listPeople } from './people.service';

export const peopleRoutes = [
  route({
    method: 'get', path: '/people', permission: 'people:read', summary: 'The people of the school, by name',
    query: PeopleQuery, response: schema<Page<PersonView>>('Page<PersonView>'), idempotent: false,
    handle: ({ tx, actor, query }) => listPeople(tx, actor, query),
  }),
  route({
    method: 'get', path: '/people/invitations', permission: 'people:write', summary: 'Invitations that are still open',
    query: PageQuery, response: schema<Page<InvitationView>>('Page<InvitationView>'), idempotent: false,
    handle: ({ tx, actor, query, now }) => listInvitations(tx, actor, query, now),
  }),
  route({
    method: 'post', path: '/people/invitations', permission: 'people:write', summary: 'Invite somebody by e-mail',
    request: InviteBody, response: schema<InvitationView>('InvitationView'), status: 201, idempotent: true,
    handle: ({ tx, actor, body, now }) => invite(tx, actor, body, now),
  }),
  route({
    method: 'delete', path: '/people/invitations/:invitationId', permission: 'people:write', summary: 'Withdraw an invitation',
    response: nothing(), idempotent: false,
    handle: async ({ tx, actor, params, now }) => {
      await withdraw(tx, actor, params.invitationId, now);
      return undefined;
    },
  }),
  route({
    method: 'patch', path: '/people/:accountId', permission: 'people:write', summary: "Change somebody's roles",
    request: ChangeRolesBody, response: schema<PersonView>('PersonView'), idempotent: false,
    handle: ({ tx, actor, params, body }) => changeRoles(tx, actor, params.accountId, body.roles),
  }),
  route({
    method: 'delete', path: '/people/:accountId', permission: 'people:write', summary: 'End a membership',
    response: nothing(), idempotent: false,
    handle: async ({ tx, actor, params, now }) => {
      await endMembership(tx, actor, params.accountId, now);
      return undefined;
    },
  }),
  route({
    method: 'get', path: '/invitations/:token', permission: 'public', summary: 'What an invitation offers',
    response: schema<InvitationOffer>('InvitationOffer'), idempotent: false, transaction: 'none',
    handle: ({ db, params, now }) => readOffer(db, params.token, now),
  }),
  route({
    method: 'post', path: '/invitations/:token/acceptance', permission: 'public', summary: 'Join the school',
    request: AcceptInvitationBody, response: nothing(), idempotent: false, transaction: 'none',
    handle: async ({ db, services, params, body, address, now }) => {
      await accept(db, services, params.token, body, { address, now });
      return undefined;
    },
  }),
];
