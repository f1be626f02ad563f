import type { Transaction } from "sequelize";
import type { Clock } from "@server/clock";
import { OutboxMail } from "@server/models/outbox-mail";
import { letterHtml, letterText, type Letter } from "./letter";

/**
 * Puts a letter into the outbox, in the transaction of what it tells about: neither is kept without
 * the other. The delivery loop sends it within a second or so.
 */
export async function queueLetter(
  letter: Letter,
  to: { address: string; organisationId: string | null },
  clock: Clock,
  transaction: Transaction,
): Promise<void> {
  const now = clock.date();
  await OutboxMail.create(
    {
      organisationId: to.organisationId,
      kind: letter.kind,
      toAddress: to.address,
      subject: letter.subject.slice(0, 200),
      bodyText: letterText(letter),
      bodyHtml: letterHtml(letter),
      state: "queued",
      nextAttemptAt: now,
      createdAt: now,
    },
    { transaction },
  );
}
