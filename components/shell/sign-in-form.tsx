"use client";

import Link from "next/link";
import { signIn } from "next-auth/react";
import { useState, type FormEvent } from "react";
import { Button } from "@/components/ui/button";
import { Input } from "@/components/ui/input";
import { Note } from "@/components/ui/note";
import { Working } from "@/components/ui/working";

interface Refused {
  title: string;
  words: string;
}

const LIMITED: Refused = { title: "Too many tries.", words: "This name or this machine rests for 15 minutes. Wait, then try again, or ask the admin for a new password." };
const WRONG: Refused = { title: "That didn’t match.", words: "Check the e-mail address and the password. After 8 tries this name rests for 15 minutes." };
const ended = (day: string): Refused => ({ title: `This account ended on ${day}.`, words: "Nobody can sign in with it any more; ask the admin if it should go on." });
const AWAY: Refused = { title: "Twinread can’t be reached.", words: "Check the network, then try again." };

/** What the server says in one word, or "ended" with the account's last day. */
function refusedBy(error: string | null | undefined): Refused {
  const day = /^ended (\d{1,2} [A-Z][a-z]+ \d{4})$/.exec(error ?? "")?.[1];
  return day ? ended(day) : error === "limited" ? LIMITED : WRONG;
}

/** Signs in and goes on to `target`, a path of this site that the page has checked. */
export function SignInForm({ workshop, target, empty }: { workshop: string; target: string; /** there is no account yet */ empty: boolean }) {
  const [refused, setRefused] = useState<Refused | null>(null);
  const [busy, setBusy] = useState(false);
  async function onSubmit(event: FormEvent<HTMLFormElement>) {
    event.preventDefault();
    const form = new FormData(event.currentTarget);
    setBusy(true);
    setRefused(null);
    const answer = await signIn("credentials", { email: String(form.get("email")), password: String(form.get("password")), redirect: false }).catch(() => undefined);
    if (answer?.ok && !answer.error) {
      // a whole new page, so that nothing of who was signed in before stays in memory
      window.location.assign(target);
      return;
    }
    setRefused(answer === undefined || answer.status >= 500 ? AWAY : refusedBy(answer.error));
    setBusy(false);
  }
  return (
    <form onSubmit={onSubmit} className="grid w-full max-w-[352px] gap-[18px] phone:max-w-none">
      <div>
        <h1 className="mb-0.5 text-t5 font-bold">{workshop}</h1>
        <p className="text-ink-2">Sign in to the bench.</p>
      </div>
      {empty ? <Note kind="note" title="There is no account yet.">Whoever started Twinread makes the first one, an admin’s, in a second terminal. The first terminal shows the command; mostly it is<code className="my-1 block">DEMO=0 npm run admin -- you@your-workshop.example</code>It prints a password that works once. Sign in with it here.</Note> : null}
      {refused ? <Note kind="block" role="alert" title={refused.title}>{refused.words}</Note> : null}
      <Input label="E-mail address" name="email" type="email" autoComplete="username" autoCapitalize="none" required />
      <Input label="Password" name="password" type="password" autoComplete="current-password" required aria-invalid={refused === WRONG || undefined} />
      <Button type="submit" variant="lead" disabled={busy}>Sign in</Button>
      {busy ? <Working what="The password is being checked" note="That takes a moment on purpose; reload the page to stop." /> : null}
      <p className="border-t border-rule pt-3.5 text-t2 text-ink-2">Customers need no account: <Link href="/request" prefetch={false}>ask for a transfer here</Link>; your case and its summary open from the links in your e-mails. A case bundle or an image can be <Link href="/verify" prefetch={false}>checked here</Link> by anyone.</p>
    </form>
  );
}
