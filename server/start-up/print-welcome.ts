import { role } from "@shared/contracts/people";
import type { Services } from "@server/services";
import { readDemoAccounts } from "./demo-people";

/** What `npm start` shows at the end: where to go and, with the demo, how to get in. */
export async function welcomeLines({ config }: Services): Promise<string[]> {
  const lines = [`Loopwright is ready at ${config.publicUrl}`];
  if (!config.demo) return lines;
  const accounts = await readDemoAccounts(config.dataDir);
  const roleWidth = Math.max(...role.options.map((name) => name.length));
  const emailWidth = Math.max(0, ...accounts.map(({ email }) => email.length));
  lines.push("", "Demo accounts (invented people and data, this machine only):");
  for (const account of accounts)
    lines.push(
      `  ${account.role.padEnd(roleWidth)}  ${account.email.padEnd(emailWidth)}  ${account.password}`,
    );
  return lines;
}
