import { createUser } from "@/lib/commands/create-user";
import { oneTimePassword } from "@/lib/auth/password";
import { type Actor, type Role, SYSTEM } from "@/lib/core/words";

const STAFF = {
  mira: ["Mira Hollis", "technician"],
  tomas: ["Tomas Brandl", "technician"],
  pell: ["Pell Aster", "technician"],
  ines: ["Ines Corvo", "lead"],
  bram: ["Bram Ostley", "lead"],
  rhys: ["Rhys Tamlin", "auditor"],
  odile: ["Odile Verrin", "admin"],
} as const satisfies Record<string, readonly [name: string, role: Role]>;

export type Staff = Record<keyof typeof STAFF, Actor>;

/** Makes the demo's accounts. `lines` are "e-mail password", one an account. */
export async function makeStaff(): Promise<{ staff: Staff; lines: string[] }> {
  const lines: string[] = [];
  const staff: Partial<Staff> = {};
  for (const key of Object.keys(STAFF) as (keyof Staff)[]) {
    const [name, role] = STAFF[key];
    const { user, password } = await createUser(SYSTEM, { email: `${key}@alderlane.example`, name, role }, oneTimePassword(), false);
    lines.push(`${user.email} ${password}`);
    staff[key] = { id: user.id, name, role };
  }
  return { staff: staff as Staff, lines };
}
