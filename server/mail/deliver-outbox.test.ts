import { inTransaction } from "@server/database/transaction";
import { OutboxMail } from "@server/models/outbox-mail";
import { testApp } from "@server/testing/test-app";
import { deliverOutbox } from "./deliver-outbox";
import { listCaughtMail, startMailFake } from "./mail-fake";
import { invitationLetter } from "./people-letters";
import { queueLetter } from "./queue-letter";
import { smtpSender, type MailMessage } from "./transport";

const app = testApp();
beforeEach(() => OutboxMail.destroy({ where: {} }));

const letter = invitationLetter({
  language: "de",
  inviter: "Jörg Weiß",
  organisation: "Wärme & Kälte",
  role: "surveyor",
  url: "https://energy.example/invitation#secret",
  days: 7,
});

const queue = (address: string) =>
  inTransaction(app.database, (transaction) =>
    queueLetter(letter, { address, organisationId: null }, app.clock, transaction),
  );

it("delivers over SMTP to the local fake, which keeps the words as written", async () => {
  const fake = await startMailFake({ port: 0, dataDir: app.config.dataDir, clock: app.clock });
  const sender = smtpSender({ ...app.config, smtpUrl: `smtp://127.0.0.1:${fake.port}` });
  try {
    await queue("nele@example.org");
    expect(await deliverOutbox(app.services, sender.send)).toBe(1);
    const [caught] = await listCaughtMail(app.config.dataDir);
    expect(caught).toMatchObject({
      to: "nele@example.org",
      subject: "Einladung zu Wärme & Kälte",
      sentAt: app.clock.date().toISOString(),
    });
    expect(caught?.text).toContain("Jörg Weiß lädt Sie ein");
    expect(caught?.text).toContain("https://energy.example/invitation#secret");
  } finally {
    sender.close();
    await fake.stop();
  }
  const [row] = await OutboxMail.findAll();
  expect(row).toMatchObject({ state: "sent", bodyText: null, bodyHtml: null });
});

it("tries again later and later, says why in the row, and gives up in the end", async () => {
  const refuse = () => Promise.reject(new Error("mailbox unavailable"));
  await queue("gone@example.org");
  await deliverOutbox(app.services, refuse);
  const row = await OutboxMail.findOne({ rejectOnEmpty: true });
  expect(row).toMatchObject({ state: "queued", attempts: 1, lastError: "mailbox unavailable" });
  expect(row.nextAttemptAt.getTime()).toBeGreaterThan(app.clock.now());
  for (let attempt = 2; attempt <= 7; attempt += 1) {
    app.clock.advance({ hours: 13 });
    await deliverOutbox(app.services, refuse);
  }
  await row.reload();
  expect(row).toMatchObject({ state: "failed", attempts: 7, bodyText: null });
});

it("sends each letter once when two servers look at the same time", async () => {
  for (let count = 0; count < 6; count += 1) await queue(`reader-${count}@example.org`);
  const sent: string[] = [];
  const send = async ({ to }: MailMessage) => void sent.push(to);
  await Promise.all([deliverOutbox(app.services, send), deliverOutbox(app.services, send)]);
  await deliverOutbox(app.services, send);
  expect(sent).toHaveLength(6);
  expect(new Set(sent).size).toBe(6);
});

it("takes up a letter again that a server took and died with", async () => {
  await queue("patient@example.org");
  await OutboxMail.update(
    { state: "sending", nextAttemptAt: new Date(app.clock.now() + 300_000) },
    { where: {} },
  );
  const send = () => Promise.resolve();
  expect(await deliverOutbox(app.services, send)).toBe(0);
  app.clock.advance({ minutes: 5 });
  expect(await deliverOutbox(app.services, send)).toBe(1);
});
