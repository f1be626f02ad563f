import { createAccessToken, listAccessTokens, revokeAccessToken } from "@shared/contracts/people";
import { endAccessToken, makeAccessToken } from "@server/commands/access-tokens";
import { defineEndpoint, type Endpoint } from "@server/http/define-endpoint";
import { AccessToken } from "@server/models/access-token";
import { may } from "@server/policies/policy";
import { presentAccessToken } from "@server/presenters/access-token-presenter";

export const accessTokenRoutes: readonly Endpoint[] = [
  defineEndpoint(listAccessTokens, {
    policy: may("manageTokens"),
    async handle({ scope }) {
      const tokens = await scope.list(AccessToken, {
        where: { revokedAt: null },
        order: [["id", "DESC"]],
      });
      return { items: tokens.map(presentAccessToken) };
    },
  }),
  defineEndpoint(createAccessToken, {
    policy: may("manageTokens"),
    status: 201,
    async handle(context, { body }) {
      const { token, secret } = await makeAccessToken(context, body);
      return { ...presentAccessToken(token), secret };
    },
  }),
  defineEndpoint(revokeAccessToken, {
    policy: may("manageTokens"),
    async handle(context, { params }) {
      await endAccessToken(context, params.tokenId);
      return {};
    },
  }),
];
