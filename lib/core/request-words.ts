import type { Damage } from "./words";

/** The choices of the public form and what they are called on the form, the slip and the desk's page. */
export const DAMAGE_WORDS: Record<Damage, string> = {
  "power-surge": "Power surge or lightning",
  "wrong-supply": "Wrong power supply",
  liquid: "Water or other liquid",
  connector: "Connector broken off",
  "just-stopped": "It just stopped",
  unknown: "I don’t know",
};

/** The same as the workshop says it, for the case and its log. */
export const DAMAGE_SAID: Record<Damage, string> = { ...DAMAGE_WORDS, unknown: "Unknown damage" };

export const IMPORTANCES = ["no-hurry", "matters", "critical"] as const;
export type Importance = (typeof IMPORTANCES)[number];
export const IMPORTANCE_WORDS: Record<Importance, string> = {
  "no-hurry": "There is no hurry",
  matters: "Work waits for it",
  critical: "Much is lost if it takes long",
};

export const ENCLOSURES = ["sent", "gone", "none", "unknown"] as const;
export type Enclosure = (typeof ENCLOSURES)[number];
export const ENCLOSURE_WORDS: Record<Enclosure, string> = {
  sent: "Yes, and I send it along with its small board",
  gone: "Yes, but I don’t have it any more",
  none: "No, it was inside a computer",
  unknown: "I don’t know",
};

export const LOCKS = ["none", "known", "lost", "unknown"] as const;
export type Lock = (typeof LOCKS)[number];
export const LOCK_WORDS: Record<Lock, string> = {
  none: "No password and no encryption",
  known: "Yes, and I know the password",
  lost: "Yes, but nobody knows the password",
  unknown: "I don’t know",
};

export const CONSENTS = ["owner", "read", "write", "solder"] as const;
export type Consent = (typeof CONSENTS)[number];

/** What the customer ticks; `keepDays` is the workshop's rule on the day of the request. */
export function consentWords(consent: Consent, keepDays: number): string {
  switch (consent) {
    case "owner":
      return "I own this drive or act for its owner.";
    case "read":
      return `You may read the chips on its board and keep the images for ${keepDays} days after it has gone back to me.`;
    case "write":
      return "You may write one image per chip to a donor board. You never write to my board.";
    case "solder":
      return "Where a clip can’t reach a chip you may lift it off my board and solder it, also onto the donor board.";
  }
}

export const CONSENT_FIELD: Record<Consent, `consent${string}`> = { owner: "consentOwner", read: "consentRead", write: "consentWrite", solder: "consentSolder" };
