import type { Transaction } from "sequelize";
import type { Scope } from "@server/database/scoped";
import { Organisation } from "@server/models/organisation";

/**
 * Makes changes to the members of one organisation take turns, so that two administrators who
 * remove each other at the same moment cannot leave nobody behind.
 */
export async function lockOrganisation(scope: Scope, transaction: Transaction): Promise<void> {
  await Organisation.findByPk(scope.organisationId, {
    lock: transaction.LOCK.UPDATE,
    transaction,
  });
}
