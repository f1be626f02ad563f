import { localDateOf } from "@shared/domain/time/local-calendar";
import { recordAudit } from "@server/commands/record-audit";
import { AuditEvent } from "@server/models/audit-event";
import type { Organisation } from "@server/models/organisation";
import { demoAccountsAllowed } from "@server/security/demo-accounts-allowed";
import type { Services } from "@server/services";
import { demoActing } from "./demo-acting";
import { DEMO_HISTORY_DAYS, demoLogFiles, type DemoLogFile } from "./demo-log-files";
import { DEMO_LOOPS } from "./harbour-court-works";
import { ensureDemoEvidence } from "./seed-evidence";
import { importDemoFile } from "./seed-import";
import { ensureDemoPlaces } from "./seed-places";

export interface SeedOptions {
  /**
   * Local day at which the logs stop (exclusive). Without it, the day on which the site was made,
   * so that the last whole week lies just behind and a seeding that was cut short goes on alike.
   */
  readonly endDate?: string;
  /** Days of quarter-hour logs, at least five weeks; thirteen months without it. */
  readonly historyDays?: number;
  /** Ends the seeding early; the next start completes it. */
  readonly signal?: AbortSignal;
}

const doneKind = "demo-seeded";
/** Enough to keep every worker busy while another file is written. */
const filesAtOnce = 3;

/**
 * Fills the demo's organisation, once: Harbour Court Works with its logs, through the commands that
 * people's requests run through, and with the imports done by the workers. The job runner must be
 * running. What its people change afterwards stays as they left it.
 * @throws Error in production mode, and where an import fails.
 */
export async function seedDemo(
  services: Services,
  organisation: Organisation,
  {
    endDate,
    historyDays = DEMO_HISTORY_DAYS,
    signal = new AbortController().signal,
  }: SeedOptions = {},
): Promise<void> {
  if (!demoAccountsAllowed(services.config)) throw new Error("The demo is not made in production.");
  const where = { organisationId: organisation.id, kind: doneKind };
  if ((await AuditEvent.count({ where })) > 0) return;

  const engineer = await demoActing(services, organisation, "engineer");
  const { site, pointIds } = await ensureDemoPlaces(engineer);
  const surveyor = { ...(await demoActing(services, organisation, "surveyor")), services };
  const stopDate = endDate ?? localDateOf(site.createdAt.getTime(), site.zone);
  await ensureDemoEvidence(surveyor, { zone: site.zone, endDate: stopDate }, pointIds);
  const files = demoLogFiles(
    site.zone,
    stopDate,
    DEMO_LOOPS.map(({ loop }) => loop.tag),
    historyDays,
  );
  const lastOf = new Map<string, Promise<void>>();
  await inTurns(files, (file) => {
    const pointId = pointIds.get(file.tag);
    if (pointId === undefined) throw new Error(`the demo has no point on ${file.tag}`);
    // Files of one point one after the other: an import left empty by a kill is taken up by one.
    const before = lastOf.get(file.tag) ?? Promise.resolve();
    const turn = before.then(() => importDemoFile(surveyor, pointId, file, signal));
    lastOf.set(file.tag, turn);
    return turn;
  });
  await recordAudit(engineer, { kind: doneKind, subject: { kind: "site", id: site.id } });
}

/** Works on a few files at a time. An error ends it once those under way have ended. */
async function inTurns(
  files: Generator<DemoLogFile>,
  work: (file: DemoLogFile) => Promise<void>,
): Promise<void> {
  const worker = async () => {
    for (const file of files) {
      await work(file);
      // Writing the next file takes half a second of this thread: let requests in between.
      await new Promise((resolve) => setImmediate(resolve));
    }
  };
  const ends = await Promise.allSettled(Array.from({ length: filesAtOnce }, worker));
  for (const end of ends) if (end.status === "rejected") throw end.reason;
}
