"use client";

import Link from "next/link";
import { type ReactNode, useState } from "react";
import useSWR from "swr";
import { BoardPanel } from "@/components/shell/board-panel";
import { PageMain } from "@/components/shell/page-main";
import { ButtonLink } from "@/components/ui/button";
import { Empty } from "@/components/ui/empty";
import { Note } from "@/components/ui/note";
import { may } from "@/lib/core/policy";
import { backgroundFetcher, Refusal } from "@/lib/http/send";
import type { BenchRow, PlacedItem, SessionView, ToReceiveRow } from "@/lib/views";
import { BenchRoute } from "./bench-route";
import { BenchTable } from "./bench-table";
import { benchGroups, capital, dateSentence, dueWords, lateWords } from "./bench-words";

const REFRESH_MS = 20_000;

/** What lies on the bench, refreshed in the background: two people at two benches see the same. */
export function BenchScreen({ rows: given, toReceive: due, waiting, firstSteps, session, mine, now: loadedAt }: { rows: BenchRow[]; toReceive: ToReceiveRow[]; waiting: PlacedItem[]; /** what a new workshop lacks, for its admin */ firstSteps: ReactNode; session: SessionView; mine: boolean; now: string }) {
  const [now, setNow] = useState(loadedAt);
  const { data, error } = useSWR<{ items: BenchRow[]; toReceive: ToReceiveRow[] }, Error>("/api/bench", backgroundFetcher, {
    fallbackData: { items: given, toReceive: due }, refreshInterval: REFRESH_MS, keepPreviousData: true, revalidateOnMount: false,
    onSuccess: () => setNow(new Date().toISOString()),
  });
  const all = data?.items ?? given;
  const toReceive = data?.toReceive ?? due;
  const own = all.filter((row) => row.mine);
  const rows = mine ? own : all;
  const groups = benchGroups(rows);
  const late = lateWords(all);
  const acts = may(session.user, "read.store");
  const records = may(session.user, "case.create");
  const first = records ? <ButtonLink variant="lead" href="/cases/new">Record a case</ButtonLink> : null;

  return (
    <>
      <BoardPanel label="Bench" className="pt-3.5 pb-4">
        <div className="flex flex-wrap items-baseline gap-x-[22px] gap-y-1">
          <h1 className="text-t7 font-bold tracking-[-0.012em]">Bench</h1>
          <p className="text-silk-2">
            {dateSentence(now, session.timeZone)}. {late ? <><b className="text-block-on-mask">{late}</b>, {dueWords(all)}</> : capital(dueWords(all))}
          </p>
          <nav className="seg ml-auto self-center phone:ml-0" aria-label="Whose work">
            <Link href="/bench" aria-current={mine ? undefined : "true"}>Everyone’s {all.length}</Link>
            <Link href="/bench?who=mine" aria-current={mine ? "true" : undefined}>Mine {own.length}</Link>
          </nav>
        </div>
        <BenchRoute groups={groups} toReceive={toReceive} />
      </BoardPanel>
      <PageMain>
        {error ? <div className="pt-4"><Note kind="caution" role="status" title="This page is not being refreshed.">{error instanceof Refusal && error.status === 401 ? "Your sign-in has ended. Reload the page to sign in again." : error.message}</Note></div> : null}
        {firstSteps}
        {waiting.length > 0 ? (
          <div className="pt-4">
            <Note kind="note" title={waiting.length === 1 ? "Something was handed over to you." : `${waiting.length} things were handed over to you.`}>
              Confirm that you have {waiting.length === 1 ? "it" : "them"}: {waiting.map((one, i) => <span key={one.handOver.id}>{i > 0 ? ", " : ""}<Link href={`/drives/${one.driveId}#items`}>{one.item}</Link></span>)}.
            </Note>
          </div>
        ) : null}
        {rows.length + toReceive.length > 0 ? <BenchTable groups={groups} toReceive={toReceive} acts={acts} signs={may(session.user, "approval.give")} now={now} timeZone={session.timeZone} /> : (
          <div className="py-8">
            {all.length > 0
              ? <Empty title="Nothing is with you." action={<ButtonLink href="/bench">Show everyone’s work</ButtonLink>}>The chips in the shop are with others now.</Empty>
              : <Empty title="The bench is empty." action={first}>Every chip of an open case shows up here, sorted by what has to be done next. {records ? "Record a case, then its drive, its original board and the chips." : "A technician or a lead records the first case."}</Empty>}
          </div>
        )}
        {rows.length > 0 && records ? <div className="no-print flex justify-end pt-4 pb-6"><ButtonLink href="/cases/new">Record a case</ButtonLink></div> : null}
      </PageMain>
    </>
  );
}
