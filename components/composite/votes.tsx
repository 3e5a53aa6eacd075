"use client";

import type { ReactNode } from "react";
import useSWR from "swr";
import { FindingLine } from "@/components/ui/finding-line";
import { Note } from "@/components/ui/note";
import { fetcher, Refusal } from "@/lib/http/send";
import { causeText } from "@/lib/core/composite-rules";
import { readTitle } from "@/lib/core/derived";
import { readsText, sizeText } from "@/lib/core/quantity";
import type { ReadView, VotesView } from "@/lib/views";
import { bitRateText, columnsOf, countsText, expectedText, madeOf, votesAnchor } from "./composite-words";
import { DisputedTable } from "./disputed-table";

/** What a composite rests on: its reads, the count, the odds with their limit, and each disputed byte. */
export function Votes({ read, heading = false }: {
  read: ReadView;
  /** more than one composite is shown: each says which it is */
  heading?: boolean;
}) {
  // a composite never changes, nor do its votes
  const { data, error } = useSWR<VotesView, Error>(`/api/reads/${read.id}/votes`, fetcher, { revalidateIfStale: false, revalidateOnFocus: false, revalidateOnReconnect: false });
  return (
    <div id={votesAnchor(read)} className="grid scroll-mt-4 gap-3.5">
      {heading ? <h3 className="text-t4 font-bold">{readTitle(read)}{read.counted ? "" : ", set aside"}</h3> : null}
      {read.derived ? <p className="max-w-[76ch]">{madeOf(read.derived)}, bit by bit. It is no read: nothing ever read these {sizeText(read.sizeBytes)} as a whole.</p> : null}
      {error ? <Note kind="block" role="alert" title="The votes can’t be shown.">{error instanceof Refusal ? error.detail : "Reload the page to try again."}</Note> : null}
      {data ? <Counted votes={data} sizeBytes={read.sizeBytes} /> : error ? null : <p className="text-ink-2" role="status">Reading the stored report of the vote.</p>}
    </div>
  );
}

function Counted({ votes, sizeBytes }: { votes: VotesView; sizeBytes: number }) {
  const { odds } = votes;
  const seatings = new Set(votes.sources.map((source) => source.seating)).size;
  return (
    <>
      <dl className="grid grid-cols-[repeat(4,auto)] justify-start gap-x-10 gap-y-2.5 mid:grid-cols-[repeat(2,auto)] slim:grid-cols-[minmax(0,1fr)]">
        <Fact term="Reads that voted">{columnsOf(votes).length} in {seatings} seatings</Fact>
        <Fact term="Result">{countsText(votes)}</Fact>
        <Fact term="Wrong bits to expect, if errors are independent">{expectedText(odds.expectedWrongBitsByMargin)}</Fact>
        <Fact term="Least sure byte is right, if errors are independent">{odds.leastSureByte === null ? "no byte was disputed" : `${(Number(odds.leastSureByte) * 100).toFixed(4)} %`}</Fact>
      </dl>
      <p className="max-w-[76ch] text-t2 text-ink-2">Counted from the votes that lost, each read has about {bitRateText(odds.bitErrorRate)} wrong.</p>
      <Note kind="caution" title="What a vote doesn’t show" className="max-w-[90ch]">{votes.limit}</Note>
      {votes.excluded.length > 0 ? (
        <ul className="grid gap-1" aria-label="Reads without a vote">
          {votes.excluded.map((one, i) => <li key={one.number ?? `source ${i}`}><FindingLine kind="aside">{one.number === null ? "A read" : readsText([one.number])} had no vote: {causeText(one.cause)}.</FindingLine></li>)}
        </ul>
      ) : null}
      {votes.disputed.length > 0 ? <DisputedTable votes={votes} sizeBytes={sizeBytes} /> : null}
    </>
  );
}

function Fact({ term, children }: { term: string; children: ReactNode }) {
  return (
    <div className="min-w-0">
      <dt className="max-w-[26ch] text-t1 text-ink-2">{term}</dt>
      <dd className="max-w-[34ch] font-medium">{children}</dd>
    </div>
  );
}
