import { randomInt } from "node:crypto";
import { chmod, mkdir, readFile, writeFile } from "node:fs/promises";
import path from "node:path";
import type { Transaction } from "sequelize";
import { z } from "zod";
import { role, type Role } from "@shared/contracts/people";
import { errorCode } from "@server/error-code";
import { inTransaction } from "@server/database/transaction";
import { Account } from "@server/models/account";
import { Membership } from "@server/models/membership";
import { Organisation } from "@server/models/organisation";
import { demoAccountsAllowed } from "@server/security/demo-accounts-allowed";
import type { Services } from "@server/services";

/** Invented people, one a role; `.example` can never be anybody's address. */
const people: readonly { name: string; email: string; role: Role }[] = [
  { name: "Marit Oduya", email: "marit.oduya@harbourcourt.example", role: "administrator" },
  { name: "Imogen Tarr", email: "imogen.tarr@harbourcourt.example", role: "surveyor" },
  { name: "Ruben Achterberg", email: "ruben.achterberg@harbourcourt.example", role: "engineer" },
  { name: "Tilda Varga", email: "tilda.varga@harbourcourt.example", role: "billingClerk" },
  { name: "Piet Lowenna", email: "piet.lowenna@harbourcourt.example", role: "tenantContact" },
];

const organisationName = "Harbour Court Works";

const demoAccount = z.object({ email: z.string(), name: z.string(), role, password: z.string() });
export type DemoAccount = z.infer<typeof demoAccount>;

function fileOf(dataDir: string): string {
  return path.join(dataDir, "demo-accounts.json");
}

/** The demo accounts with their passwords, as kept in the data folder; empty before the demo. */
export async function readDemoAccounts(dataDir: string): Promise<DemoAccount[]> {
  try {
    return z.array(demoAccount).parse(JSON.parse(await readFile(fileOf(dataDir), "utf8")));
  } catch (error) {
    if (errorCode(error) === "ENOENT") return [];
    throw error;
  }
}

// Without letters and digits that look alike: people copy these from a terminal.
const alphabet = "abcdefghjkmnpqrstuvwxyz23456789";

function newPassword(): string {
  const group = () =>
    Array.from({ length: 4 }, () => alphabet[randomInt(alphabet.length)]).join("");
  return [group(), group(), group(), group()].join("-");
}

/**
 * Makes the demo organisation and one account a role, once; passwords are made on this machine and
 * kept in the data folder for its owner alone. Where the file was lost, new passwords are set.
 * Answers the organisation.
 * @throws Error in production mode, where such accounts must not exist.
 */
export async function ensureDemoPeople(services: Services): Promise<Organisation> {
  const { config, database } = services;
  if (!demoAccountsAllowed(config)) throw new Error("Demo accounts are not made in production.");
  const kept = await readDemoAccounts(config.dataDir);
  const accounts = people.map((person) => ({
    ...person,
    password: kept.find(({ email }) => email === person.email)?.password ?? newPassword(),
  }));
  if (kept.length < people.length) await keepAccounts(config.dataDir, accounts);
  return inTransaction(database, async (transaction) => {
    const organisation = await ensureOrganisation(services, transaction);
    for (const account of accounts)
      await ensurePerson(services, organisation, account, kept.length > 0, transaction);
    return organisation;
  });
}

async function keepAccounts(dataDir: string, accounts: readonly DemoAccount[]): Promise<void> {
  await mkdir(dataDir, { recursive: true });
  await writeFile(fileOf(dataDir), `${JSON.stringify(accounts, null, 2)}\n`, { mode: 0o600 });
  // The mode above counts for a new file only.
  await chmod(fileOf(dataDir), 0o600);
}

async function ensureOrganisation({ clock }: Services, transaction: Transaction) {
  const [organisation] = await Organisation.findOrCreate({
    where: { isDemo: true },
    defaults: { name: organisationName, isDemo: true, createdAt: clock.date() },
    transaction,
  });
  return organisation;
}

async function ensurePerson(
  { clock, passwords }: Services,
  organisation: Organisation,
  { email, name, role, password }: DemoAccount,
  passwordIsKept: boolean,
  transaction: Transaction,
): Promise<void> {
  const known = await Account.findOne({ where: { email }, transaction });
  if (known && passwordIsKept) return;
  const passwordHash = await passwords.hash(password);
  if (known) {
    await known.update({ passwordHash }, { transaction });
    return;
  }
  const createdAt = clock.date();
  const account = await Account.create(
    { email, name, passwordHash, isDemo: true, createdAt },
    { transaction },
  );
  await Membership.create(
    {
      organisationId: organisation.id,
      accountId: account.id,
      role,
      state: "active",
      createdAt,
    },
    { transaction },
  );
}
