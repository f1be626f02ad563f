import { Op, type Transaction } from "sequelize";
import type { Scope } from "@server/database/scoped";
import { NotFound } from "@server/http/errors";
import { Account } from "@server/models/account";
import { Invitation } from "@server/models/invitation";
import { Membership } from "@server/models/membership";

const withPerson = [
  { model: Account, as: "account" },
  { model: Invitation, as: "invitation" },
];

/** Members and open invitations after the cursor, one more than `limit` to tell of a next page. */
export function listMembersAfter(
  scope: Scope,
  { after, limit }: { after: string | null; limit: number },
): Promise<Membership[]> {
  return scope.list(Membership, {
    where: { state: { [Op.ne]: "removed" }, ...(after === null ? {} : { id: { [Op.gt]: after } }) },
    include: withPerson,
    order: [["id", "ASC"]],
    limit: limit + 1,
  });
}

/** One member or open invitation. @throws NotFound for a removed one too. */
export async function findMember(
  scope: Scope,
  id: string,
  transaction?: Transaction,
): Promise<Membership> {
  const member = await scope.find(Membership, {
    where: { id, state: { [Op.ne]: "removed" } },
    include: withPerson,
    transaction,
  });
  if (member === null) throw new NotFound("member");
  return member;
}
