import type { Metadata } from "next";
import { env } from "@/lib/env";
import { hasNoAccount } from "@/lib/queries/first-steps";
import { SignInArt } from "@/components/shell/sign-in-art";
import { SignInForm } from "@/components/shell/sign-in-form";
import { DemoStrip } from "@/components/shell/demo-strip";
import { Logo } from "@/components/ui/logo";

export const metadata: Metadata = { title: "Sign in" };

/** Only addresses of this very site: anything else after signing in would be a trap for passwords. */
function ownPath(wanted: string | string[] | undefined): string {
  if (typeof wanted !== "string" || !/^\/(?![/\\])/.test(wanted)) return "/bench";
  const url = new URL(wanted, "http://own.invalid");
  return url.host === "own.invalid" ? url.pathname + url.search + url.hash : "/bench";
}

export default async function SignInPage({ searchParams }: { searchParams: Promise<{ callbackUrl?: string | string[] }> }) {
  const { workshop, demo } = env();
  const empty = await hasNoAccount();
  const target = ownPath((await searchParams).callbackUrl);
  return (
    <div className="flex min-h-screen flex-col">
      {demo ? <DemoStrip /> : null}
      <main id="main" className="grid flex-1 grid-cols-[minmax(0,1.15fr)_minmax(0,1fr)] phone:grid-cols-1 phone:grid-rows-[auto_1fr]">
        <div className="relative flex flex-col justify-between overflow-hidden border-r-4 border-bare-edge bg-mask px-12 py-9 text-silk phone:gap-3.5 phone:border-r-0 phone:border-b-4 phone:px-4 phone:py-[18px]">
          <SignInArt />
          <span className="relative flex items-center gap-[11px] text-[1.1875rem] font-bold tracking-[-0.005em]"><Logo />Twinread</span>
          <p className="relative max-w-[24em] text-[1.75rem] leading-9 font-semibold tracking-[-0.01em] phone:text-[1.125rem] phone:leading-6">Nothing is written to a chip until its reads agree and a second person has signed.</p>
        </div>
        <div className="grid place-items-center px-8 py-10 phone:place-items-[start_stretch] phone:px-4 phone:py-[26px]">
          <SignInForm workshop={workshop} target={target} empty={empty} />
        </div>
      </main>
    </div>
  );
}
