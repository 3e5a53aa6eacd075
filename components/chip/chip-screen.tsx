"use client";

import { useRouter } from "next/navigation";
import { type ReactNode, useEffect, useState } from "react";
import useSWR from "swr";
import { compositesOf, offersComposite } from "@/components/composite/composite-words";
import { MakeComposite } from "@/components/composite/make-composite";
import { Votes } from "@/components/composite/votes";
import { PageMain } from "@/components/shell/page-main";
import { StripLegend } from "@/components/strip/legend";
import { StripStack } from "@/components/strip/strip-stack";
import { Buttons } from "@/components/ui/button";
import { Empty } from "@/components/ui/empty";
import { Note } from "@/components/ui/note";
import { DesignatorPlate } from "@/components/ui/plate";
import { Section } from "@/components/ui/section";
import { momentText } from "@/components/ui/times";
import { may } from "@/lib/core/policy";
import { sizeText } from "@/lib/core/quantity";
import { backgroundFetcher, Refusal } from "@/lib/http/send";
import type { ChipView, ReadBackView, SessionView } from "@/lib/views";
import { AddReads } from "./add-reads";
import { ApprovalSection } from "./approval-section";
import { ChipHead } from "./chip-head";
import { ChipVerdict } from "./chip-verdict";
import { EncryptionNote } from "./encryption-note";
import { compareHref, isKept, nameOf, readBackKey } from "./chip-words";
import { ReadsTable } from "./reads-table";
import { TransferSection } from "./transfer-section";
import { SiblingNote } from "./unit-note";
import { contentsOf } from "./upload-form";

const REFRESH_MS = 5_000;

/** The whole page of one chip; refreshed in the background, so that two people at two benches see the same. */
export function ChipScreen({ chip: given, readBack, session, today, photos }: {
  chip: ChipView;
  /** after a write, what came back against the approved image takes the place of the reads */
  readBack: ReadBackView | null;
  session: SessionView;
  /** the workshop's calendar day, "2026-03-12" */
  today: string;
  /** the section with the chip's photos, made by the page */
  photos: ReactNode;
}) {
  const router = useRouter();
  const { data, error, mutate } = useSWR<ChipView, Error>(`/api/chips/${given.id}/view`, backgroundFetcher, { fallbackData: given, refreshInterval: REFRESH_MS, keepPreviousData: true, revalidateOnMount: false });
  const chip = data ?? given;
  const { user, timeZone } = session;
  const changed = () => mutate();
  const original = chip.boardRole === "original";
  const [donorAsked, setDonorAsked] = useState(0);
  const readDonor = () => {
    setDonorAsked((n) => n + 1);
    document.getElementById("add")?.scrollIntoView({ block: "start" });
  };
  const latest = chip.reads.reduce<ChipView["reads"][number] | null>((last, r) => (last && last.storedAt >= r.storedAt ? last : r), null);
  const [key, shownKey] = [readBackKey(chip), readBackKey(given)];
  // the read-backs' strips come with the page itself: another read-back, another page
  useEffect(() => {
    if (key !== shownKey) router.refresh();
  }, [key, shownKey, router]);
  const stack = readBack?.stack ?? chip.stack;
  const composites = compositesOf(chip.reads);
  const differ = stack.lanes.some((lane) => lane.differingBytes > 0);
  const shared = { chip, user, timeZone, onChanged: changed };
  const donorPlate = <DesignatorPlate designator={original ? chip.pair?.designator ?? chip.designator : chip.designator} board="donor" />;

  return (
    <>
      <ChipHead chip={chip} timeZone={timeZone} today={today} />
      <PageMain>
        {error ? <div className="pt-4"><Note kind="caution" role="status" title="This page is not being refreshed.">{error instanceof Refusal && error.status === 401 ? "Your sign-in has ended. Reload the page to sign in again." : error.message}</Note></div> : null}
        {chip.case.open ? null : <div className="pt-4"><Note kind="note" title={`Case ${chip.case.ref} is closed.`}>What is stored stays to be read. Nothing is added or changed until a lead reopens the case.</Note></div>}
        {chip.drive.encryption || chip.siblings.length > 0 ? <div className="grid gap-2 pt-4 empty:hidden"><EncryptionNote encryption={chip.drive.encryption} /><SiblingNote chip={chip} /></div> : null}
        <Section first title="What was found" note={latest ? `After ${nameOf(latest)}, ${momentText(latest.storedAt, timeZone)}` : "No read is stored yet."}>
          <ChipVerdict chip={chip} readBack={readBack} user={user} onReadDonor={readDonor} onChanged={changed} />
        </Section>
        {stack.rows.length > 0 ? (
          <Section wide title={differ ? "Where they differ" : "What the reads hold"} note={`Each read as ${stack.rows[0].cells.length} cells${stack.cellBytes >= 1 ? ` of ${sizeText(Math.ceil(stack.cellBytes))}` : ""}. The line between two reads is whole where they agree.`} aside={<StripLegend />}>
            <StripStack key={stack.rows.map((r) => r.readId).join()} stack={stack} onOpen={(at) => router.push(compareHref(chip, readBack, at))} />
          </Section>
        ) : null}
        <Section title="Reads" note="Every file is kept as it came. A read is never changed or deleted, only set aside with a reason.">
          {chip.reads.length > 0 ? (
            <>
              <ReadsTable {...shared} />
              {chip.case.open && may(user, "composite.make") && offersComposite(chip) ? (
                <Buttons className="pt-4"><MakeComposite chip={chip} onChanged={changed} /><span className="max-w-[60ch] text-ink-2">A last resort: what most reads say, bit by bit. Three equal reads are better.</span></Buttons>
              ) : null}
            </>
          ) : <Empty title={`No reads of ${chip.designator} yet.`}>Put the clip on, read the chip {chip.policy.reads} times in {chip.policy.seatings} seatings and drop the files below.</Empty>}
        </Section>
        {composites.length > 0 ? (
          <Section title="The votes" note="What each disputed byte of a composite rests on.">
            <div className="grid gap-8">{composites.map((read) => <Votes key={read.id} read={read} heading={composites.length > 1} />)}</div>
          </Section>
        ) : null}
        {chip.case.open && may(user, "read.store") && contentsOf(chip).length > 0 ? (
          <div className="no-print">
            <Section id="add" title="Add reads" note="The digest is computed in this browser first; the server computes it again and the two must match.">
              <AddReads chip={chip} userId={user.id} donorAsked={donorAsked} onChanged={changed} />
            </Section>
          </div>
        ) : null}
        {original && !isKept(chip) ? (
          <>
            <Section id="approval" title="Approval" note={chip.approval ? `Signed ${momentText(chip.approval.givenAt, timeZone)}.` : "Opens when every line is met."}>
              <ApprovalSection {...shared} />
            </Section>
            <Section id="transfer" title="Write and read back" note={<>Donor {chip.pair ? donorPlate : "not paired yet"}</>}>
              <TransferSection {...shared} />
            </Section>
          </>
        ) : null}
        {photos}
      </PageMain>
    </>
  );
}
