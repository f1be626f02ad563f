import type { Role } from "@shared/contracts/people";
import type { Language, Letter } from "./letter";

const roleNames: Record<Language, Record<Role, string>> = {
  en: {
    administrator: "administrator",
    surveyor: "surveyor",
    engineer: "engineer",
    billingClerk: "billing clerk",
    tenantContact: "tenant contact",
  },
  de: {
    administrator: "Verwaltung",
    surveyor: "Messtechnik",
    engineer: "Ingenieurwesen",
    billingClerk: "Abrechnung",
    tenantContact: "Mieterkontakt",
  },
};

interface InvitationFacts {
  language: Language;
  inviter: string;
  organisation: string;
  role: Role;
  url: string;
  days: number;
}

/** To somebody who is asked to join an organisation. */
export function invitationLetter(facts: InvitationFacts): Letter {
  const { inviter, organisation, url, days } = facts;
  const role = roleNames[facts.language][facts.role];
  if (facts.language === "de")
    return {
      kind: "invitation",
      subject: `Einladung zu ${organisation}`,
      greeting: "Guten Tag,",
      before: [`${inviter} lädt Sie ein, bei ${organisation} mitzuarbeiten. Ihre Rolle: ${role}.`],
      link: { label: "Einladung annehmen", url },
      after: [
        `Der Link gilt ${days} Tage und nur einmal.`,
        "Wenn Sie nichts damit anfangen können, löschen Sie diese Nachricht: Es geschieht nichts.",
      ],
    };
  return {
    kind: "invitation",
    subject: `Invitation to ${organisation}`,
    greeting: "Hello,",
    before: [`${inviter} invites you to work with ${organisation}. Your role: ${role}.`],
    link: { label: "Accept the invitation", url },
    after: [
      `The link works once, within ${days} days.`,
      "If this means nothing to you, delete this message: nothing will happen.",
    ],
  };
}

/** To somebody who forgot their password, or whose address somebody else typed. */
export function passwordResetLetter(facts: {
  language: Language;
  name: string;
  url: string;
}): Letter {
  if (facts.language === "de")
    return {
      kind: "password-reset",
      subject: "Neues Passwort",
      greeting: `Guten Tag ${facts.name},`,
      before: ["für Ihr Konto wurde ein neues Passwort angefordert."],
      link: { label: "Neues Passwort setzen", url: facts.url },
      after: [
        "Der Link gilt eine Stunde und nur einmal.",
        "Wenn Sie das nicht waren, löschen Sie diese Nachricht: Ihr Passwort bleibt, wie es ist.",
      ],
    };
  return {
    kind: "password-reset",
    subject: "New password",
    greeting: `Hello ${facts.name},`,
    before: ["a new password was asked for on your account."],
    link: { label: "Set a new password", url: facts.url },
    after: [
      "The link works once, within one hour.",
      "If that was not you, delete this message: your password stays as it is.",
    ],
  };
}

/** Tells the owner of an account that its password has changed, in case it was not them. */
export function passwordChangedLetter(facts: { language: Language; name: string }): Letter {
  if (facts.language === "de")
    return {
      kind: "password-changed",
      subject: "Ihr Passwort wurde geändert",
      greeting: `Guten Tag ${facts.name},`,
      before: ["das Passwort Ihres Kontos wurde geändert. Andere Sitzungen sind beendet."],
      link: null,
      after: ["Wenn Sie das nicht waren, melden Sie sich bei Ihrer Verwaltung."],
    };
  return {
    kind: "password-changed",
    subject: "Your password was changed",
    greeting: `Hello ${facts.name},`,
    before: ["the password of your account was changed. Other sessions have ended."],
    link: null,
    after: ["If that was not you, tell an administrator of your organisation."],
  };
}
