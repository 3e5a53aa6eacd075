import { dayInWords } from "@/lib/core/account-end";
import { listText } from "@/lib/core/quantity";
import type { Role } from "@/lib/core/words";
import { ROLES } from "@/lib/core/words";
import type { UserView } from "@/lib/views";

const DOES: Record<Role, string> = {
  technician: "receives and returns parcels, records drives, boards and chips, takes and uploads reads, writes and reads back",
  lead: "does all that a technician does; approves, sends back, revokes, closes cases, sends summaries",
  auditor: "reads everything, checks logs and images, downloads bundles, records assessments; changes nothing else",
  admin: "looks after users, policy and outbox; touches no image, approval or log",
};

export function roleDoes(role: Role): string {
  return DOES[role];
}

/** The sentence under the field: "An auditor reads …". */
export function roleHint(role: string, limited = false): string {
  const does = limited ? DOES.auditor.replace("everything", "the cases of their list") : DOES[role as Role];
  return `A ${role} ${does}.`.replace(/^A a/, "An a");
}

const NAMED = 6;

/** The first few numbers of a case list, and how many more there are. */
export function namedCases(cases: readonly { ref: string }[]): { refs: string[]; more: number } {
  return { refs: cases.slice(0, NAMED).map((one) => one.ref), more: Math.max(0, cases.length - NAMED) };
}

/** "limited to 26-0003 and 26-0007, until 31 January 2027"; null for an account without limits. */
export function limitsText({ cases, endsOn }: Pick<UserView, "cases" | "endsOn">): string | null {
  const { refs, more } = namedCases(cases ?? []);
  const only = cases && `limited to ${listText(more > 0 ? [...refs, `${more} more`] : refs) || "no case"}`;
  return [only, endsOn && `${only ? "" : "open "}until ${dayInWords(endsOn)}`].filter(Boolean).join(", ") || null;
}

export const ROLE_OPTIONS = ROLES.map((role) => ({ value: role, label: role }));
