import { OutboxMail } from "@server/models/outbox-mail";

/** The last letter queued to an address; fails the test when there is none. */
export async function lastLetterTo(address: string): Promise<OutboxMail> {
  return OutboxMail.findOne({
    where: { toAddress: address },
    order: [["id", "DESC"]],
    rejectOnEmpty: true,
  });
}

/** The secret of the link in the last letter to an address. */
export async function secretSentTo(address: string): Promise<string> {
  const { bodyText } = await lastLetterTo(address);
  const secret = /#([\w-]{40,})/.exec(bodyText ?? "")?.[1];
  if (secret === undefined) throw new Error(`the letter to ${address} holds no link`);
  return secret;
}
