import type { Role } from "@/lib/core/words";

export interface PersonView {
  id: string;
  name: string;
  role: Role | "system";
}

export interface UserView {
  id: string;
  email: string;
  name: string;
  role: Role;
  disabled: boolean;
  mustChangePassword: boolean;
  lastSeenAt: string | null;
  /** the last day of an auditor's account, year-month-day in the workshop's time zone */
  endsOn: string | null;
  /** that day is over: as good as switched off */
  ended: boolean;
  /** the only cases that this auditor may see, by number; null without a list */
  cases: { id: string; ref: string }[] | null;
}

export interface BenchTokenView {
  id: string;
  name: string;
  createdAt: string;
  lastUsedAt: string | null;
  withdrawnAt: string | null;
}

export interface SessionView {
  /** `cases`: ids of the only cases that a limited auditor may see, so that `may()` answers for the buttons too */
  user: { id: string; name: string; email: string; role: Role; cases?: string[] };
  demo: boolean;
  workshop: string;
  timeZone: string;
  benchCount: number;
}
