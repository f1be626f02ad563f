import { randomUUID } from "node:crypto";
import { mkdir, readdir, readFile, rm, writeFile } from "node:fs/promises";
import path from "node:path";
import { simpleParser } from "mailparser";
import { SMTPServer } from "smtp-server";
import { z } from "zod";
import { caughtMail } from "@shared/contracts/people";
import type { Clock } from "@server/clock";

export type CaughtMail = z.infer<typeof caughtMail>;

/** As many letters as the folder keeps; the oldest go first. */
const kept = 200;

function folderOf(dataDir: string): string {
  return path.join(dataDir, "mail");
}

/** What the fake has kept, newest first. */
export async function listCaughtMail(dataDir: string): Promise<CaughtMail[]> {
  const names = await fileNames(dataDir);
  return Promise.all(
    names.reverse().map(async (name) => {
      const text = await readFile(path.join(folderOf(dataDir), name), "utf8");
      return caughtMail.parse(JSON.parse(text));
    }),
  );
}

async function fileNames(dataDir: string): Promise<string[]> {
  await mkdir(folderOf(dataDir), { recursive: true, mode: 0o700 });
  const names = await readdir(folderOf(dataDir));
  return names.filter((name) => name.endsWith(".json")).sort();
}

async function keep(raw: Buffer, dataDir: string, clock: Clock): Promise<void> {
  const parsed = await simpleParser(raw);
  const to = [parsed.to ?? []].flat().map((address) => address.text);
  const mail: CaughtMail = {
    id: randomUUID(),
    to: to.join(", "),
    subject: parsed.subject ?? "",
    text: parsed.text ?? "",
    sentAt: clock.date().toISOString(),
  };
  const names = await fileNames(dataDir);
  const file = `${mail.sentAt.replace(/[:.]/g, "-")}-${mail.id}.json`;
  // Letters hold live links, so only the owner of the folder reads them.
  await writeFile(path.join(folderOf(dataDir), file), JSON.stringify(mail), { mode: 0o600 });
  const surplus = names.slice(0, Math.max(0, names.length + 1 - kept));
  await Promise.all(surplus.map((name) => rm(path.join(folderOf(dataDir), name), { force: true })));
}

/**
 * A mail server on loopback that keeps what it is given and sends nothing on: e-mail then works on a
 * laptop and in tests as it does in earnest. Port 0 takes any free one.
 */
export async function startMailFake(options: {
  port: number;
  dataDir: string;
  clock: Clock;
}): Promise<{ port: number; stop(): Promise<void> }> {
  const server = new SMTPServer({
    authOptional: true,
    disabledCommands: ["STARTTLS"],
    size: 1_000_000,
    onData(stream, _session, done) {
      const chunks: Buffer[] = [];
      stream.on("data", (chunk: Buffer) => chunks.push(chunk));
      stream.on("error", done);
      stream.on("end", () => {
        keep(Buffer.concat(chunks), options.dataDir, options.clock).then(() => done(), done);
      });
    },
  });
  await new Promise<void>((resolve, reject) => {
    server.once("error", reject);
    server.listen(options.port, "127.0.0.1", resolve);
  });
  const address = server.server.address();
  return {
    port: typeof address === "object" && address !== null ? address.port : options.port,
    stop: () => new Promise((resolve) => server.close(() => resolve())),
  };
}
