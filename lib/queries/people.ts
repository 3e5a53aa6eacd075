import { NIL, SYSTEM } from "@/lib/core/words";
import type { PersonView } from "@/lib/views";
import { type Transaction, User } from "@/models";

export type People = (id: string | null) => PersonView;

/** Names and roles by id. A workshop has few people: one small query serves a whole page. */
export async function people(tx?: Transaction): Promise<People> {
  const users = await User.findAll({ attributes: ["id", "name", "role"], transaction: tx });
  const known = new Map<string, PersonView>(users.map((u) => [u.id, { id: u.id, name: u.name, role: u.role }]));
  return (id) => (id === null || id === NIL ? { ...SYSTEM } : known.get(id) ?? { id, name: "someone", role: "system" });
}
