import type { ShareView } from "@/lib/views";
import type { Share } from "@/models";
import type { People } from "./people";

export function shareView(row: Share, who: People): ShareView {
  return {
    id: row.id, createdAt: row.createdAt.toISOString(), createdBy: who(row.createdBy), expiresAt: row.expiresAt.toISOString(),
    openedAt: row.openedAt?.toISOString() ?? null, withdrawnAt: row.withdrawnAt?.toISOString() ?? null, email: row.email,
  };
}
