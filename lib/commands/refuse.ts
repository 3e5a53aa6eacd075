import { isHidden, may, type Thing, type Verb } from "@/lib/core/policy";
import type { Actor } from "@/lib/core/words";
import { AppError } from "@/lib/errors";

const WHO: Partial<Record<Verb, string>> = {
  "composite.make": "Only a lead can make a composite. Ask one, or take more reads.",
  "approval.give": "Only a lead can approve an image. Ask for approval on the chip's page.",
  "approval.revoke": "Only a lead can revoke an approval.",
  "approval.send-back": "Only a lead can send an approval back.",
  "read.hand-out-any": "You can download the approved image and a donor's own content. Ask a lead or an auditor for any other image.",
  "read.set-aside": "A technician can set aside their own reads only. Ask a lead for this one.",
  "case.erase": "Erasing images and keeping them longer is for a lead or an admin.",
  "board.allow-other-number": "The donor's board number differs from the original's. Only a lead can record it, with a reason.",
};

/** What an address that leads nowhere answers. */
export const NO_ADDRESS = "The interface has no such address. Check its spelling and the id in it.";

/** Asks the policy and throws the refusal; `detail` names the way out where there is one. */
export function allow(actor: Actor, verb: Verb, thing: Thing = {}): void {
  if (isHidden(actor, verb)) throw new AppError("not-found", NO_ADDRESS);
  if (!may(actor, verb, thing)) throw new AppError("forbidden", WHO[verb] ?? `As ${actor.role} you can look at this, but this step is for others in the workshop.`);
}

export function notFound(what: string): AppError {
  return new AppError("not-found", `There is no ${what} under this address. Check the link.`);
}

/** The only cases that this actor may see, for a query's condition; null when there is no limit. */
export function casesOf(actor: Actor): readonly string[] | null {
  return actor.cases ?? null;
}

/** A case outside an auditor's list is not there for them: 404, like one that never was. */
export function allowCase(actor: Actor, caseId: string, what = "case"): void {
  if (actor.cases && !actor.cases.includes(caseId)) throw notFound(what);
}

/** The same as part of a query's condition; `column` holds a case's id. Nothing at all where there is no limit. */
export function inCases<C extends "id" | "caseId">(actor: Actor, column: C): { [K in C]?: string[] } {
  return (actor.cases ? { [column]: [...actor.cases] } : {}) as { [K in C]?: string[] };
}
