import type { Metadata } from "next";
import { AuditFilter, isFiltered } from "@/components/audit/audit-filter";
import { AuditPage } from "@/components/audit/audit-page";
import { hoursText, imagesSentence } from "@/components/audit/audit-words";
import { ImageList } from "@/components/audit/image-list";
import { ButtonLink } from "@/components/ui/button";
import { Empty } from "@/components/ui/empty";
import { FindingLine } from "@/components/ui/finding-line";
import { Section } from "@/components/ui/section";
import { exactText } from "@/components/ui/times";
import { Verdict } from "@/components/ui/verdict";
import { signedIn } from "@/lib/auth/page";
import { countOf, withCommas } from "@/lib/core/quantity";
import { orNotFound } from "@/lib/http/page-errors";
import { auditImages, imageCounts } from "@/lib/queries/audit-images";
import { auditInputOf } from "@/lib/schemas/audit";

export const metadata: Metadata = { title: "Audit: stored images" };
const STATES = [{ value: "not-sound", label: "Damaged or missing" }, { value: "damaged", label: "Damaged" }, { value: "missing", label: "Missing" }, { value: "sound", label: "Equals its digest" }, { value: "erased", label: "Erased" }];

export default async function AuditImagesPage({ searchParams }: { searchParams: Promise<Record<string, string | string[] | undefined>> }) {
  const { actor, session } = await signedIn();
  const input = auditInputOf(await searchParams, { sort: "checked", order: "asc" });
  const list = await orNotFound(() => auditImages(actor, input));
  const counts = await imageCounts(actor);
  const { mark, sentence } = imagesSentence(counts, new Date().toISOString());
  const empty = isFiltered(input)
    ? <Empty title="No stored image fits this choice." action={<ButtonLink href="/audit/images">Show all stored images</ButtonLink>}>The search takes the first digits of a SHA-256.</Empty>
    : <Empty title="No image is stored yet.">The first read that a technician stores begins it.</Empty>;
  return (
    <AuditPage session={session} current="images" title="Stored images" note="Each is read whole again in turn, the one unverified for longest first, and compared with its digest.">
      <Section strong title="Stored bytes" note={counts.oldest ? `Longest ago: ${exactText(counts.oldest, session.timeZone)}` : undefined}>
        <Verdict mark={mark} sentence={sentence} why="A fault is read a second time before it is called one. It is written into the log of every drive that has the image; its approval falls and the image is not handed out." />
      </Section>
      <Section title="Reading again" note="Set where the server runs.">
        <FindingLine kind={counts.keeping === "keeping-up" ? "ok" : "caution"}>{counts.keepingSentence}</FindingLine>
        <p className="mt-1 max-w-[76ch] text-ink-2">
          {counts.days > 0 ? `Each is read again within ${countOf(counts.days, "day")}, at ${withCommas(counts.mebibytesPerSecond)} MiB a second at most: one reading of all takes ${hoursText(counts.hours)}. ` : ""}
          {counts.neverChecked === 0 ? "Every one was read again since it was stored." : `${withCommas(counts.neverChecked)} ${counts.neverChecked === 1 ? "was" : "were"} not read again yet since the upload, which compared ${counts.neverChecked === 1 ? "it" : "them"} with the digest.`}
        </p>
      </Section>
      <Section title="Images" note="Unverified for longest first.">
        <AuditFilter list="images" path="/audit/images" input={input} total={list.total} words={{ label: "SHA-256", placeholder: "First digits" }} what={{ label: "State", options: STATES }} />
        <ImageList list={list} sort={input.sort} order={input.order} timeZone={session.timeZone} empty={empty} />
      </Section>
    </AuditPage>
  );
}
