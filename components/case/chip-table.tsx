import { chipKind, stateMark } from "@/components/chip/chip-words";
import { CorrectChip } from "@/components/drive/correct-chip";
import { originalOf } from "@/components/drive/drive-words";
import { StripThumb } from "@/components/strip/strip-thumb";
import { ButtonLink } from "@/components/ui/button";
import { FindingLine } from "@/components/ui/finding-line";
import { DesignatorPlate } from "@/components/ui/plate";
import type { Policy } from "@/lib/core/words";
import { isPowerOfTwo, listText } from "@/lib/core/quantity";
import type { ChipSummary, DriveView } from "@/lib/views";
import { unitOf } from "@/lib/core/two-chips";
import { donorOf, ownContentWords, readsWords } from "./case-words";
import { MiniRoute } from "./mini-route";

function OwnContent({ donor }: { donor: ChipSummary | null }) {
  if (!donor) return <span className="text-ink-3">no pair yet</span>;
  const { saved, words } = ownContentWords(donor);
  return <FindingLine kind={saved ? "ok" : "caution"}>{words}</FindingLine>;
}

function Row({ chip, drive, policy, corrects }: { chip: ChipSummary; drive: DriveView; policy: Policy; corrects: boolean }) {
  const original = chip.boardRole === "original";
  const donor = original ? donorOf(chip, drive) : chip;
  const mark = stateMark(chip.state.state);
  const kept = original && !chip.needsTransfer;
  const unit = unitOf(originalOf(drive)?.chips ?? []);
  const others = unit.some((one) => one.id === chip.id) ? unit.filter((one) => one.id !== chip.id).map((one) => one.designator) : [];
  return (
    <tr>
      <th scope="row">{original ? <><DesignatorPlate designator={chip.designator} board="original" />{others.length > 0 ? <span className="mt-1 block text-t1 font-normal text-ink-2">with {listText(others)}</span> : null}</> : <span className="font-normal text-ink-3">not paired</span>}</th>
      <td className="min-w-[14ch]">{chipKind(chip)}{isPowerOfTwo(chip.sizeBytes) ? null : <span className="block text-t2 text-ink-2">size is not a power of two</span>}{chip.supplyMillivolts === null ? <FindingLine kind="caution">Look the supply up first</FindingLine> : null}</td>
      <td className="whitespace-nowrap" data-l="Reads">{!original ? "own content only" : chip.composite ? <b className="font-semibold text-caution">{readsWords(chip, policy)}</b> : readsWords(chip, policy)}</td>
      <td className="l-row"><StripThumb thumbnail={chip.thumbnail} /></td>
      <td className="text-center phone:text-left">{original && chip.needsTransfer ? <MiniRoute state={chip.state.state} /> : <span className="text-ink-3">{original ? "kept for reference" : ""}</span>}</td>
      <td data-l="Donor">{donor ? <DesignatorPlate designator={donor.designator} board="donor" /> : <span className="text-ink-3">not paired</span>}</td>
      <td className="whitespace-nowrap"><OwnContent donor={donor} /></td>
      <td className="l-full">{kept && mark !== "block" ? <><b>Kept for reference.</b> It is not part of the transfer.</> : <><b className={mark === "block" ? "text-block" : ""}>{chip.state.label}.</b> {chip.state.sentence}</>}</td>
      <td className="l-row text-right whitespace-nowrap phone:flex phone:items-center phone:gap-4 phone:text-left">
        <ButtonLink size="small" href={`/chips/${chip.id}`}>Open {chip.designator}</ButtonLink>
        {corrects ? <span className="no-print block"><CorrectChip chip={chip} originals={originalOf(drive)?.chips ?? []} /></span> : null}
      </td>
    </tr>
  );
}

/** The chips of one drive: the original's with their pairs, then donor chips that have none. */
export function ChipTable({ drive, policy, corrects }: { drive: DriveView; policy: Policy; corrects: boolean }) {
  const chips = drive.boards.flatMap((board) => board.chips);
  const rows = [...chips.filter((chip) => chip.boardRole === "original"), ...chips.filter((chip) => chip.boardRole === "donor" && !chip.pair)];
  if (rows.length === 0) return null;
  return (
    <div className="overflow-x-auto pt-3 phone:overflow-visible">
      <table className="ruled lines chips-table">
        <caption className="sr-only">Chips of Drive {drive.letter}</caption>
        <thead>
          <tr>
            {["On the original", "Kind", "Reads", "Image"].map((head) => <th key={head} scope="col">{head}</th>)}
            <th scope="col" className="!text-center">Read · approve · write · read back</th>
            {["On the donor", "Own content", "State and what to do"].map((head) => <th key={head} scope="col">{head}</th>)}
            <th scope="col"><span className="sr-only">Open</span></th>
          </tr>
        </thead>
        <tbody>{rows.map((chip) => <Row key={chip.id} chip={chip} drive={drive} policy={policy} corrects={corrects} />)}</tbody>
      </table>
    </div>
  );
}
