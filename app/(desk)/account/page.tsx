import type { Metadata } from "next";
import { BenchTokens } from "@/components/account/bench-tokens";
import { PasswordForm } from "@/components/account/password-form";
import { SignIns } from "@/components/account/sign-ins";
import { DeskShell } from "@/components/shell/desk-shell";
import { PageMain } from "@/components/shell/page-main";
import { Note } from "@/components/ui/note";
import { PageTitle, Section } from "@/components/ui/section";
import { limitsText, roleDoes } from "@/components/user/role-words";
import { signedIn } from "@/lib/auth/page";
import { orNotFound } from "@/lib/http/page-errors";
import { SESSION_ABSOLUTE_SECONDS, SESSION_IDLE_SECONDS } from "@/lib/limits";
import { accountView } from "@/lib/queries/users";

export const metadata: Metadata = { title: "Account" };

export default async function AccountPage() {
  const { actor, session } = await signedIn();
  const { user, tokens } = await orNotFound(() => accountView(actor));
  const limits = limitsText(user);
  const mustChoose = user.mustChangePassword;
  return (
    <DeskShell session={session}>
      <PageMain className="pb-8">
        <PageTitle note={limits ? `${user.email}, ${user.role}, ${limits}.` : `${user.email}, ${user.role}: ${roleDoes(user.role)}.`}>{user.name}</PageTitle>
        <Section title="Password" note="Another password ends your sign-ins elsewhere.">
          {mustChoose ? <Note kind="caution" title="Choose a password of your own first." className="mb-4 max-w-[76ch]">You signed in with a one-time password that an admin made, so somebody else has seen it. Everything else opens once you have chosen another.</Note> : null}
          <PasswordForm email={user.email} mustChoose={mustChoose} />
        </Section>
        {mustChoose ? null : (
          <Section title="Bench tokens" note="For scripts on a bench computer: they upload reads in your name, with your role.">
            <BenchTokens tokens={tokens} timeZone={session.timeZone} />
          </Section>
        )}
        <Section title="Sign-ins" note={`A sign-in ends by itself after ${SESSION_IDLE_SECONDS / 60} idle minutes, or ${SESSION_ABSOLUTE_SECONDS / 3600} hours in all.`}>
          <SignIns canEndOthers={!mustChoose} />
        </Section>
      </PageMain>
    </DeskShell>
  );
}
