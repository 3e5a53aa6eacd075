import type { Role } from "@/lib/core/words";
import { ROLES } from "@/lib/core/words";

const DOES: Record<Role, string> = {
  technician: "receives and returns parcels, records drives, boards and chips, takes and uploads reads, writes and reads back",
  lead: "does all that a technician does; approves, sends back, revokes, closes cases, sends summaries",
  auditor: "reads everything, checks logs and images, downloads bundles, records assessments; changes nothing else",
  admin: "looks after users, policy and outbox; touches no image, approval or log",
};

export function roleDoes(role: Role): string {
  return DOES[role];
}

export const ROLE_OPTIONS = ROLES.map((role) => ({ value: role, label: role }));
