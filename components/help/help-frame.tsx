import type { ReactNode } from "react";
import { DeskShell } from "@/components/shell/desk-shell";
import { PageMain } from "@/components/shell/page-main";
import { PublicShell } from "@/components/shell/public-shell";
import type { SessionView } from "@/lib/views";

/** Help holds nothing secret: whoever is signed in keeps the desk's edge, everybody else sees the workshop's head. */
export function HelpFrame({ session, workshop, demo, children }: { session: SessionView | null; workshop: string; demo: boolean; children: ReactNode }) {
  if (session) return <DeskShell session={session}><PageMain className="pb-8">{children}</PageMain></DeskShell>;
  return (
    <PublicShell workshop={workshop} demo={demo} line="Help">
      <main id="main" tabIndex={-1} className="mx-auto max-w-[1120px] px-8 pb-8 outline-none phone:px-4 print:max-w-none print:p-0">{children}</main>
    </PublicShell>
  );
}
