import type { Metadata } from "next";
import { placeWords, reachWords } from "@/components/request/contact-words";
import { RequestForm } from "@/components/request/request-form";
import { WhereToFind } from "@/components/request/where-to-find";
import { PublicShell } from "@/components/shell/public-shell";
import { dayYearText } from "@/components/ui/times";
import { formStamp } from "@/lib/commands/request-secrets";
import { env } from "@/lib/env";
import { currentPolicy } from "@/lib/queries/policy";

export const metadata: Metadata = { title: "Ask for a chip transfer" };

export default async function RequestPage() {
  const { workshop, workshopAddress, workshopHours, workshopContact, demo, timeZone } = env();
  const { erasureDays } = await currentPolicy();
  return (
    <PublicShell workshop={workshop} demo={demo} line={placeWords(workshopAddress, workshopHours)}>
      <main id="main" tabIndex={-1} className="rq outline-none">
        <header className="rq-head">
          <h1 className="text-t7 font-bold tracking-[-0.012em] phone:text-[1.625rem] phone:leading-8">Ask us to move your drive’s chips</h1>
          <p className="mt-1.5 max-w-[64ch] text-t4 text-ink-2">We read the memory chips on your damaged board, move their content to a donor board and prove that both are equal. Fill this in, print the slip at the end and put it in the parcel.</p>
        </header>
        <RequestForm keepDays={erasureDays} stamp={formStamp()} today={dayYearText(new Date().toISOString(), timeZone)} workshop={workshop} ask={reachWords(workshopContact)} />
        <WhereToFind />
      </main>
    </PublicShell>
  );
}
