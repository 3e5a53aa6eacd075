import { headers } from "next/headers";
import { redirect } from "next/navigation";
import type { Actor } from "@/lib/core/words";
import { env } from "@/lib/env";
import { sessionView } from "@/lib/queries/session";
import type { SessionView } from "@/lib/views";
import { actorOfUser } from "./account";
import { signedInUser } from "./actor";

/** For pages: the actor and what the shell shows, or a way to the sign-in page and back. */
export async function signedIn(): Promise<{ actor: Actor; session: SessionView }> {
  const user = await signedInUser();
  const here = (await headers()).get("x-twinread-path") ?? "/bench";
  if (!user) redirect(`/sign-in?callbackUrl=${encodeURIComponent(here)}`);
  if (user.mustChangePassword && !here.startsWith("/account")) redirect("/account?choose=password");
  const actor = await actorOfUser(user);
  return { actor, session: await sessionView(actor, user.email) };
}

/** For pages that anyone may read: who is signed in keeps the desk's shell, everybody else gets the workshop's head. */
export async function shellForAnyone(): Promise<{ session: SessionView | null; workshop: string; demo: boolean }> {
  const { workshop, demo } = env();
  const user = await signedInUser();
  const session = user && !user.mustChangePassword ? await sessionView(await actorOfUser(user), user.email) : null;
  return { session, workshop, demo };
}
