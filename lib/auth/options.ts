import { randomUUID } from "node:crypto";
import type { NextAuthOptions } from "next-auth";
import CredentialsProvider from "next-auth/providers/credentials";
import { SESSION_ABSOLUTE_SECONDS } from "@/lib/limits";
import { Session, User } from "@/models";
import { hasEnded, lastDayInWords } from "./account";
import { addressOf } from "./address";
import { clearAttempts, mayTry } from "./attempts";
import { passwordFits } from "./password";

declare module "next-auth" {
  interface Session {
    sid?: string;
  }
  interface User {
    sid: string;
  }
}
declare module "next-auth/jwt" {
  interface JWT {
    sid?: string;
  }
}

/**
 * next-auth, behind this one file. The JWT carries nothing but the id of a session row: role, disabling and idle time
 * are read from the database at each request (see actor.ts).
 */
export const authOptions: NextAuthOptions = {
  session: { strategy: "jwt", maxAge: SESSION_ABSOLUTE_SECONDS },
  pages: { signIn: "/sign-in", error: "/sign-in" },
  providers: [
    CredentialsProvider({
      name: "password",
      credentials: { email: { type: "text" }, password: { type: "password" } },
      async authorize(credentials, request) {
        const email = String(credentials?.email ?? "").trim().slice(0, 254);
        const password = String(credentials?.password ?? "").slice(0, 1024);
        const address = addressOf((request?.headers as Record<string, string> | undefined)?.["x-forwarded-for"]);
        if (!(await mayTry(email, address))) throw new Error("limited");
        const found = email ? await User.findOne({ where: { email } }) : null;
        // the database takes é for e: such an address would have a count of guesses of its own for the same account
        const user = found && found.email.toLowerCase() === email.toLowerCase() ? found : null;
        const fits = await passwordFits(user?.passwordHash ?? null, password);
        if (!user || !fits || user.disabledAt) return null;
        await clearAttempts(email, address);
        // told only to who knows the password; the sign-in page makes a sentence of it
        if (hasEnded(user)) throw new Error(`ended ${lastDayInWords(user)}`);
        const now = new Date();
        const session = await Session.create({ id: randomUUID(), userId: user.id, createdAt: now, lastSeenAt: now });
        return { id: user.id, sid: session.id };
      },
    }),
  ],
  callbacks: {
    jwt({ token, user }) {
      return user ? { sub: user.id, sid: user.sid } : token;
    },
    session({ session, token }) {
      return { expires: session.expires, sid: token.sid };
    },
  },
  events: {
    async signOut({ token }) {
      if (token?.sid) await Session.update({ endedAt: new Date() }, { where: { id: token.sid } });
    },
  },
};
