import { getServerSession } from "next-auth";
import { type Actor, NIL } from "@/lib/core/words";
import { AppError } from "@/lib/errors";
import { SESSION_ABSOLUTE_SECONDS, SESSION_IDLE_SECONDS } from "@/lib/limits";
import { BenchToken, Session, User } from "@/models";
import { actorOfUser, hasEnded, lastDayInWords } from "./account";
import { authOptions } from "./options";
import { tokenHash } from "./token";

const NOBODY: Actor = { id: NIL, name: "nobody", role: "technician" };
const TOUCH_MS = 30_000;
const SIGN_IN = "Sign in first, or send a bench token as Authorization: Bearer.";

/** Who asks: by bench token when there is an Authorization header (cookies are then ignored), else by session. */
export async function actorOf(request: Request, open?: "anyone" | "new-password"): Promise<Actor> {
  if (open === "anyone") return NOBODY;
  const header = request.headers.get("authorization");
  if (header !== null) return actorOfToken(header);
  const user = await signedInUser(request.headers.get("x-twinread-background") === "1");
  if (!user) throw new AppError("not-signed-in", SIGN_IN);
  if (user.mustChangePassword && open !== "new-password") {
    throw new AppError("forbidden", "Choose a password of your own first, on your account page.");
  }
  return actorOfUser(user);
}

async function actorOfToken(header: string): Promise<Actor> {
  const token = /^Bearer ([A-Za-z0-9_-]{43})$/.exec(header)?.[1];
  const row = token && (await BenchToken.findOne({ where: { tokenHash: tokenHash(token) }, include: [{ model: User, as: "user" }] }));
  if (!row || row.withdrawnAt) throw new AppError("not-signed-in", "This bench token isn't known or was withdrawn. Make a new one on the account page.");
  const user = (row as unknown as { user: User }).user;
  if (user.disabledAt) throw new AppError("not-signed-in", "The account of this bench token is switched off. Ask the admin.");
  if (hasEnded(user)) throw new AppError("not-signed-in", `The account of this bench token ended on ${lastDayInWords(user)}. Ask the admin.`);
  if (!row.lastUsedAt || Date.now() - row.lastUsedAt.getTime() > TOUCH_MS) await row.update({ lastUsedAt: new Date() });
  return actorOfUser(user);
}

/**
 * The user of the session cookie, or null. The session row decides, not the cookie: ended, idle for 30 minutes,
 * older than 8 hours, a disabled user or one past the end date count at once. A background refresh does not keep the session alive.
 */
export async function signedInUser(background = false): Promise<User | null> {
  const cookie = await getServerSession(authOptions);
  if (!cookie?.sid) return null;
  const session = await Session.findOne({ where: { id: cookie.sid }, include: [{ model: User, as: "user" }] });
  if (!session || session.endedAt) return null;
  const now = Date.now();
  const user = (session as unknown as { user: User }).user;
  const idle = now - session.lastSeenAt.getTime() > SESSION_IDLE_SECONDS * 1000;
  const old = now - session.createdAt.getTime() > SESSION_ABSOLUTE_SECONDS * 1000;
  if (idle || old || user.disabledAt || hasEnded(user, now)) {
    await session.update({ endedAt: new Date(now) });
    return null;
  }
  if (!background && now - session.lastSeenAt.getTime() > TOUCH_MS) await session.update({ lastSeenAt: new Date(now) });
  return user;
}

/** The id of the session that asks; null with a bench token. */
export async function sessionId(): Promise<string | null> {
  return (await getServerSession(authOptions))?.sid ?? null;
}
