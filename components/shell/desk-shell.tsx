import Link from "next/link";
import type { ReactNode } from "react";
import { ToastProvider } from "@/components/ui/toast";
import type { SessionView } from "@/lib/views";
import { Logo } from "@/components/ui/logo";
import { PaperHouse } from "@/components/ui/paper-name";
import { DemoStrip } from "./demo-strip";
import { FindField } from "./find-field";
import { Fingers } from "./fingers";
import { Footer } from "./footer";
import { Going } from "./going";
import { KeyHelp } from "./key-help";
import { ThemeFlip } from "./theme-flip";
import { tabsOf, type TabKey } from "./tabs";
import { WhoMenu } from "./who-menu";

/**
 * Every signed-in page: the board's edge with its contact fingers, then the page. A page about chips starts with
 * `<BoardPanel>`; whatever is read or decided stands in `<main id="main">`, which the page itself brings (PageMain).
 */
export function DeskShell({ session, current = null, children }: { session: SessionView; current?: TabKey | null; children: ReactNode }) {
  return (
    <ToastProvider>
      <a href="#main" className="skip-link sr-only focus:not-sr-only focus:absolute focus:top-2 focus:left-2 focus:z-50 focus:bg-sheet focus:px-4 focus:py-3 focus:text-ink">Go to the main part</a>
      {session.demo ? <DemoStrip /> : null}
      <PaperHouse words={`${session.workshop}, all times ${session.timeZone}`} demo={session.demo} />
      <header className="edge">
        <div className="mx-auto flex min-h-[60px] max-w-[1440px] items-stretch gap-7 px-8 grand:max-w-[1680px] mid:gap-[18px] phone:flex-wrap phone:gap-x-4 phone:gap-y-0 phone:px-4 phone:pb-1">
          <Link href="/bench" className="flex items-center gap-[11px] pt-1.5 text-[1.1875rem] font-bold tracking-[-0.005em] no-underline phone:py-1.5"><Logo />Twinread</Link>
          <Fingers tabs={tabsOf(session.user)} current={current} benchCount={session.benchCount} />
          <div className="ml-auto flex items-center gap-4 pt-1.5 phone:py-1">
            <FindField />
            <WhoMenu user={session.user} />
            <ThemeFlip />
          </div>
        </div>
      </header>
      {children}
      <Going />
      <Footer workshop={session.workshop} timeZone={session.timeZone} keys={<KeyHelp pages={tabsOf(session.user)} />} />
    </ToastProvider>
  );
}
