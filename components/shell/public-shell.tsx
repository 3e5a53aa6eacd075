import Link from "next/link";
import type { ReactNode } from "react";
import { Logo } from "@/components/ui/logo";
import { PaperHouse } from "@/components/ui/paper-name";
import { DemoStrip } from "./demo-strip";

/** Pages for customers: the workshop comes first, Twinread only signs the work. The page brings its own `<main id="main">`. */
export function PublicShell({ workshop, line, demo, checking = false, children }: {
  workshop: string;
  line?: string;
  demo: boolean;
  /** this is the page for checking itself */
  checking?: boolean;
  children: ReactNode;
}) {
  return (
    <>
      <a href="#main" className="skip-link sr-only focus:not-sr-only focus:absolute focus:top-2 focus:left-2 focus:z-50 focus:bg-sheet focus:px-4 focus:py-3 focus:text-ink">Go to the main part</a>
      {demo ? <DemoStrip /> : null}
      <PaperHouse words={workshop} demo={demo} />
      <header className="board no-print">
        <div className="mx-auto flex max-w-[1120px] flex-wrap items-center gap-x-5 gap-y-1 px-8 py-3 phone:px-4">
          <b className="text-[1.0625rem]">{workshop}</b>
          {line ? <span className="text-silk-2">{line}</span> : null}
          <span className="ml-auto flex items-center gap-2 text-t2 text-silk-2"><Logo width={22} className="text-silk" />Kept with Twinread</span>
        </div>
      </header>
      {children}
      {checking ? null : (
        <footer className="no-print mx-auto flex max-w-[1120px] px-8 phone:px-4">
          <p className="w-full border-t border-rule pt-3.5 pb-7 text-t2 text-ink-2">Have a case bundle or an image of a chip? <Link href="/verify" prefetch={false}>Check it here</Link>: nothing is sent. How the job is done and what the words mean stands in the <Link href="/help" prefetch={false}>help</Link>.</p>
        </footer>
      )}
    </>
  );
}
