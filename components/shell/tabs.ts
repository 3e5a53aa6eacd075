import { may } from "@/lib/core/policy";
import type { Role } from "@/lib/core/words";

export type TabKey = "bench" | "receive" | "cases" | "shelf" | "custody" | "audit" | "find" | "users" | "policy" | "outbox";

export interface Tab {
  key: TabKey;
  label: string;
  href: string;
}

/** The contact fingers of one role. */
export function tabsOf(user: { id: string; role: Role }): Tab[] {
  const tabs: Tab[] = [{ key: "bench", label: "Bench", href: "/bench" }, ...(may(user, "parcel.receive") ? [{ key: "receive", label: "Receive", href: "/receive" } as const] : []), { key: "cases", label: "Cases", href: "/cases" }, ...(may(user, "shelf.read") ? [{ key: "shelf", label: "Shelf", href: "/shelf" } as const] : []), { key: "custody", label: "Custody log", href: "/custody" }];
  if (may(user, "audit.read")) tabs.push({ key: "audit", label: "Audit", href: "/audit" });
  tabs.push({ key: "find", label: "Find", href: "/find" });
  if (may(user, "user.manage")) tabs.push({ key: "users", label: "Users", href: "/users" });
  if (may(user, "policy.change")) tabs.push({ key: "policy", label: "Policy", href: "/policy" });
  if (may(user, "outbox.read")) tabs.push({ key: "outbox", label: "Outbox", href: "/outbox" });
  return tabs;
}
