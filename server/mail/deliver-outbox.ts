import { Op } from "sequelize";
import { inTransaction } from "@server/database/transaction";
import { OutboxMail } from "@server/models/outbox-mail";
import type { Services } from "@server/services";
import type { SendMail } from "./transport";

/** Minutes until the next try after each failure; after the last the letter has failed. */
const backOffMinutes = [0.2, 1, 5, 30, 120, 720];
/** A letter taken by a server that died is taken up again after this. */
const leaseMs = 5 * 60_000;

type Needs = Pick<Services, "database" | "clock" | "log">;

/**
 * Sends the letters that are due and answers how many went out. Several servers may run it at once:
 * each takes other rows. A server that dies between sending and noting it sends once more: a letter
 * twice is better than none.
 */
export async function deliverOutbox(services: Needs, send: SendMail): Promise<number> {
  let sent = 0;
  for (const mail of await claim(services)) {
    if (await deliver(mail, services, send)) sent += 1;
  }
  return sent;
}

function claim({ database, clock }: Needs): Promise<OutboxMail[]> {
  const now = clock.date();
  return inTransaction(database, async (transaction) => {
    const due = await OutboxMail.findAll({
      where: { state: ["queued", "sending"], nextAttemptAt: { [Op.lte]: now } },
      order: [["nextAttemptAt", "ASC"]],
      limit: 10,
      lock: transaction.LOCK.UPDATE,
      skipLocked: true,
      transaction,
    });
    for (const mail of due) {
      mail.state = "sending";
      mail.attempts += 1;
      mail.nextAttemptAt = new Date(now.getTime() + leaseMs);
      await mail.save({ transaction });
    }
    return due;
  });
}

async function deliver(mail: OutboxMail, { clock, log }: Needs, send: SendMail): Promise<boolean> {
  try {
    await send({
      to: mail.toAddress,
      subject: mail.subject,
      text: mail.bodyText ?? "",
      html: mail.bodyHtml ?? "",
    });
  } catch (error) {
    const message = error instanceof Error ? error.message : String(error);
    const waitMinutes = backOffMinutes[mail.attempts - 1];
    log.warn({ mailId: mail.id, kind: mail.kind, attempts: mail.attempts, message }, "mail failed");
    await (waitMinutes === undefined
      ? mail.update({ state: "failed", lastError: message.slice(0, 500), ...noBody })
      : mail.update({
          state: "queued",
          lastError: message.slice(0, 500),
          nextAttemptAt: new Date(clock.now() + waitMinutes * 60_000),
        }));
    return false;
  }
  await mail.update({ state: "sent", sentAt: clock.date(), lastError: null, ...noBody });
  return true;
}

// Links in a body are secrets of which the database keeps hashes only.
const noBody = { bodyText: null, bodyHtml: null };
