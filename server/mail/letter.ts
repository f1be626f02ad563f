import type { z } from "zod";
import type { language } from "@shared/contracts/people";

export type Language = z.infer<typeof language>;

/** A letter before it is addressed. Paragraphs are plain text; the link stands on its own. */
export interface Letter {
  readonly kind: string;
  readonly subject: string;
  readonly greeting: string;
  readonly before: readonly string[];
  readonly link: { readonly label: string; readonly url: string } | null;
  readonly after: readonly string[];
}

const escapes: Readonly<Record<string, string>> = {
  "&": "&amp;",
  "<": "&lt;",
  ">": "&gt;",
  '"': "&quot;",
};

function escapeHtml(text: string): string {
  return text.replace(/[&<>"]/g, (character) => escapes[character] ?? character);
}

export function letterText(letter: Letter): string {
  const parts = [
    letter.greeting,
    ...letter.before,
    ...(letter.link ? [`${letter.link.label}:\n${letter.link.url}`] : []),
    ...letter.after,
    "Loopwright",
  ];
  return `${parts.join("\n\n")}\n`;
}

/** The same words as simple HTML: names come from people, so everything is escaped. */
export function letterHtml(letter: Letter): string {
  const paragraph = (text: string) => `<p>${escapeHtml(text)}</p>`;
  const link = letter.link
    ? `<p><a href="${escapeHtml(letter.link.url)}">${escapeHtml(letter.link.label)}</a></p>`
    : "";
  return [
    "<!doctype html><html><body>",
    ...[letter.greeting, ...letter.before].map(paragraph),
    link,
    ...letter.after.map(paragraph),
    "<p>Loopwright</p></body></html>",
  ].join("");
}
