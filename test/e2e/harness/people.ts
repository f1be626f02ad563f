import { hash } from "bcryptjs";
import type { Page } from "playwright-core";
import type { Role } from "@shared/contracts/people";
import { connectDatabase } from "@server/database/connect";
import { Account } from "@server/models/account";
import { Membership } from "@server/models/membership";
import { Organisation } from "@server/models/organisation";
import type { Application } from "./application";

/** The password of every account made here. */
export const password = "warm return, cold supply";

/** The address of the person who holds a role in the organisation made here. */
export const emailOf = (role: Role) => `${role.toLowerCase()}@e2e.example`;

/**
 * Makes an organisation with nothing in it but one person for each role. The first organisation
 * has nobody who could invite its people, so this part alone goes past the API.
 */
export async function foundOrganisation(application: Application, name = "Test works") {
  const database = connectDatabase(application.databaseUrl, { poolSize: 2 });
  try {
    const createdAt = new Date();
    const organisation = await Organisation.create({ name, createdAt });
    const passwordHash = await hash(password, 4);
    const roles: Role[] = [
      "administrator",
      "surveyor",
      "engineer",
      "billingClerk",
      "tenantContact",
    ];
    for (const role of roles) {
      const account = await Account.create({
        email: emailOf(role),
        name: `Test ${role}`,
        passwordHash,
        createdAt,
      });
      await Membership.create({
        organisationId: organisation.id,
        accountId: account.id,
        role,
        state: "active",
        createdAt,
      });
    }
    return { organisationId: organisation.id };
  } finally {
    await database.close();
  }
}

/** Signs in through the screen, as a person would. */
export async function signIn(page: Page, application: Application, role: Role): Promise<void> {
  await page.goto(`${application.address}/sign-in`);
  await page.getByLabel("Email").fill(emailOf(role));
  await page.getByLabel("Password", { exact: true }).fill(password);
  await page.getByRole("button", { name: "Sign in", exact: true }).click();
  await page.waitForURL((url) => !url.pathname.startsWith("/sign-in"));
}
