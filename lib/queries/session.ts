import { QueryTypes } from "sequelize";
import { casesOf } from "@/lib/commands/refuse";
import { type Actor, NIL, type Role } from "@/lib/core/words";
import { env } from "@/lib/env";
import type { SessionView } from "@/lib/views";
import { connection } from "@/models";

/** What the shell of every signed-in page shows. */
export async function sessionView(actor: Actor, email: string): Promise<SessionView> {
  const only = casesOf(actor);
  const [{ n }] = await connection().query<{ n: number }>(
    `SELECT COUNT(*) AS n FROM chips JOIN boards ON boards.id = chips.board_id JOIN drives ON drives.id = boards.drive_id
     JOIN cases ON cases.id = drives.case_id WHERE cases.closed_at IS NULL AND boards.role = 'original' AND chips.needs_transfer ${only ? "AND cases.id IN (?)" : ""}`,
    { replacements: only ? [only.length > 0 ? only : [NIL]] : [], type: QueryTypes.SELECT },
  );
  return {
    user: { id: actor.id, name: actor.name, email, role: actor.role as Role, ...(only ? { cases: [...only] } : {}) }, demo: env().demo, workshop: env().workshop, timeZone: env().timeZone, benchCount: Number(n),
  };
}
