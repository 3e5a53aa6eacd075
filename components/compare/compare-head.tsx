import Link from "next/link";
import { Crumbs } from "@/components/ui/crumbs";
import { HelpLink } from "@/components/ui/help-link";
import { Mark } from "@/components/ui/mark";
import { DesignatorPlate } from "@/components/ui/plate";
import { readTitle } from "@/lib/core/derived";
import { listText, readsText, withCommas } from "@/lib/core/quantity";
import type { Stage } from "@/lib/core/words";
import type { ChipView, ComparedReads, ReadView } from "@/lib/views";
import { ChooseReads } from "./choose-reads";
import { stagesToCompare } from "./places";

const STAGE_WORDS: Record<Stage, string> = { before: "reads of the original", donor: "the donor’s own content", after: "read-backs" };

/** What the comparison found, and the ways to other reads. */
export function CompareHead({ chip, reads, compared, stage, chosen }: { chip: ChipView; reads: readonly ReadView[]; compared: ComparedReads | null; stage: Stage; chosen: readonly number[] | null }) {
  const crossed = compared !== null && compared.reads.some((r) => r.stage !== compared.reads[0].stage);
  const others = stagesToCompare(reads).filter((s) => crossed || s !== stage);
  const titles = compared?.reads.map(readTitle) ?? [];
  const [a, b] = titles;
  const plain = compared !== null && compared.reads.every((r) => !r.derived && r.stage === "before");
  // a read-back was judged against the approved image when it came: that says what to do about the write
  const judged = crossed ? compared.reads[1].findings.find((f) => f.severity === "blocks" || f.code === "verified") : undefined;
  const verdict = judged ?? compared?.diagnosis;
  return (
    <>
      <Crumbs items={[{ label: `Case ${chip.case.ref}`, href: `/cases/${chip.case.id}` }, { label: chip.designator, href: `/chips/${chip.id}` }, { label: "Compare" }]} />
      <header className="flex flex-wrap items-center gap-x-5 gap-y-2 pt-[18px] pb-3.5">
        <h1 className="flex flex-wrap items-center gap-3 text-t5 font-bold">
          <DesignatorPlate designator={chip.designator} board={chip.boardRole} word />
          {!compared ? "Compare reads" : crossed ? `Approved image (${a}) and ${b}` : plain ? readsText(compared.reads.map((r) => r.number)) : listText(titles)}
        </h1>
        <div className="ml-auto flex flex-wrap items-end gap-x-5 gap-y-2">
          {others.map((s) => <Link key={s} href={`/chips/${chip.id}/compare?stage=${s}`}>Compare {STAGE_WORDS[s]}</Link>)}
          {chosen ? <ChooseReads reads={reads} stage={stage} chosen={chosen} /> : null}
        </div>
        {verdict && compared ? (
          <p className="flex basis-full items-start gap-2.5 text-t4">
            <Mark kind={compared.equal ? "ok" : "block"} size={20} className="mt-0.5 [--hole:var(--paper)]" />
            <span className="max-w-[86ch]"><b>{verdict.message}</b> {verdict.advice} <HelpLink href={`/help/findings#${verdict.code}`} about={verdict.message} />
              {compared.equal || !compared.differingBits ? null : <span className="text-ink-2"> {withCommas(compared.differingBits.zeroToOne)} bits read 0 in {a} and 1 in {b}, {withCommas(compared.differingBits.oneToZero)} the other way round.</span>}
            </span>
          </p>
        ) : null}
      </header>
    </>
  );
}
