import {
  acceptInvitation,
  inviteMember,
  listMembers,
  readInvitation,
  removeMember,
  resendInvitation,
  updateMember,
} from "@shared/contracts/people";
import { acceptByLink, openInvitation } from "@server/commands/accept-invitation";
import { changeMember, removeMembership } from "@server/commands/change-member";
import { inviteAgain, inviteByEmail } from "@server/commands/invite-member";
import { pageOf, readCursor } from "@server/http/cursor";
import { defineEndpoint, type Endpoint } from "@server/http/define-endpoint";
import { Account } from "@server/models/account";
import { Organisation } from "@server/models/organisation";
import { everyone, may } from "@server/policies/policy";
import { presentMember } from "@server/presenters/member-presenter";
import { listMembersAfter } from "@server/queries/members";
import { sessionOf } from "@server/queries/session-of";

const linkLimit = { perAddress: 50, minutes: 15, onlyFailures: true } as const;

export const memberRoutes: readonly Endpoint[] = [
  defineEndpoint(listMembers, {
    policy: may("manageMembers"),
    async handle({ scope, actor }, { query: { cursor, limit } }) {
      const found = await listMembersAfter(scope, { after: readCursor(cursor), limit });
      const { rows, nextCursor } = pageOf(found, limit);
      return { items: rows.map((member) => presentMember(member, actor)), nextCursor };
    },
  }),
  defineEndpoint(inviteMember, {
    policy: may("manageMembers"),
    status: 201,
    async handle(context, { body }) {
      return presentMember(await inviteByEmail(context, body), context.actor);
    },
  }),
  defineEndpoint(resendInvitation, {
    policy: may("manageMembers"),
    async handle(context, { params }) {
      return presentMember(await inviteAgain(context, params.memberId), context.actor);
    },
  }),
  defineEndpoint(updateMember, {
    policy: may("manageMembers"),
    async handle(context, { params, body }) {
      return presentMember(await changeMember(context, params.memberId, body), context.actor);
    },
  }),
  defineEndpoint(removeMember, {
    policy: may("manageMembers"),
    async handle(context, { params }) {
      await removeMembership(context, params.memberId);
      return {};
    },
  }),
  defineEndpoint(readInvitation, {
    policy: everyone,
    limit: linkLimit,
    async handle({ clock }, { body }) {
      const { member, email } = await openInvitation(body.secret, clock.date());
      const [organisation, account] = await Promise.all([
        Organisation.findByPk(member.organisationId, { rejectOnEmpty: true }),
        Account.findOne({ where: { email } }),
      ]);
      const { role } = member;
      return { organisationName: organisation.name, email, role, hasAccount: account !== null };
    },
  }),
  defineEndpoint(acceptInvitation, {
    policy: everyone,
    limit: linkLimit,
    async handle(context, { body }) {
      return sessionOf(await acceptByLink(context, body), context);
    },
  }),
];
