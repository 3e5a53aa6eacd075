import { randomBytes } from "node:crypto";
import type { Role } from "@/lib/core/words";
import { done, fromPage, makeToken, sessionOf, tokenOf } from "./station";

/** An account that a test may change as it likes. */
export interface Newcomer {
  id: string;
  email: string;
  password: string;
}

/** An account as the admin makes it: its password works once. */
export async function makeAccount(role: Role): Promise<Newcomer> {
  const email = `${role}-${randomBytes(5).toString("hex")}@newcomers.example`;
  const made = await done<{ user: { id: string }; password: string }>("POST", "/api/users", {
    token: await tokenOf("odile"), json: { email, name: `New ${role}`, role },
  });
  return { id: made.user.id, email, password: made.password };
}

/** The same with a password of its own, signed in. */
export async function makeNewcomer(role: Role): Promise<Newcomer & { cookie: string }> {
  const account = await makeAccount(role);
  const cookie = await sessionOf(account.email, account.password);
  const password = `quiet bench ${randomBytes(9).toString("hex")}`;
  await done("POST", "/api/account/password", { ...fromPage(cookie), json: { current: account.password, next: password } }, 200);
  return { ...account, password, cookie };
}

export async function makeNewcomerToken(role: Role): Promise<Newcomer & { cookie: string; token: string; tokenId: string }> {
  const newcomer = await makeNewcomer(role);
  const { id, token } = await makeToken(newcomer.cookie, "API tests");
  return { ...newcomer, token, tokenId: id };
}

export async function changeAccount(id: string, change: { role?: Role; disabled?: boolean; newPassword?: true; cases?: string[] | null; endsOn?: string | null }): Promise<{ password?: string }> {
  return done("PATCH", `/api/users/${id}`, { token: await tokenOf("odile"), json: change });
}
