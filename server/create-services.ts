import { createPasswords } from "./security/passwords";
import type { Services } from "./services";

type Given = Pick<Services, "config" | "database" | "clock" | "log">;

/** Makes what lives as long as the process around a connected, migrated database. */
export async function createServices(given: Given): Promise<Services> {
  return { ...given, passwords: createPasswords(given.config.passwordCost) };
}

/** Lets go of everything in the reverse order; the database last. */
export async function closeServices(services: Services): Promise<void> {
  await services.passwords.close();
  await services.database.close();
}
