import { momentText } from "@/components/ui/times";
import { boardName } from "@/lib/core/board-name";
import { countOf, sizeText } from "@/lib/core/quantity";
import { type Policy, seatingLetter, type Stage } from "@/lib/core/words";
import type { ReadSheetView } from "@/lib/views";
import { type Caution, Cautions } from "./cautions";
import { Comb } from "./comb";
import { Fact, PrintHead, Sheet } from "./sheet";

type Row = ReadSheetView["stages"][number]["reads"][number];

/** Lines on the sheet: all of one stage, or what two stages share. At least `ROOM` of them are free for a hand. */
const LINES: Record<Stage, number> = { before: 18, donor: 8, after: 8 };
const ROOM = 4;
const TITLE: Record<Stage, string> = { before: "Reads of the original", donor: "The donor’s own content, before anything is written", after: "Read-backs, after the write" };
const WORD: Record<Stage, string> = { before: "Read", donor: "Own", after: "Back" };
const CAUTIONS: Record<ReadSheetView["board"], Caution[]> = { original: ["static", "power", "supply", "original", "heat"], donor: ["static", "power", "supply", "donor"] };

function Line({ row, number, timeZone }: { row: Row | null; number: number; timeZone: string }) {
  return (
    <tr>
      <td className="mono font-bold">{number}</td>
      <td className="mono">{row ? momentText(row.at, timeZone) : null}</td>
      <td className="mono">{row ? seatingLetter(row.seating) : null}</td>
      <td><span className="line-clamp-2">{row?.reader}</span></td>
      <td className="mono">{row ? (row.supplyMillivolts === null ? "?" : row.supplyMillivolts / 1000) : null}</td>
      <td><Comb text={row?.crc32.toUpperCase()} length={8} /></td>
      <td><Comb text={row ? row.sha256.slice(0, 8) + row.sha256.slice(-8) : undefined} length={16} gapAfter={8} /></td>
      <td><span className="line-clamp-2">{row ? `${row.operator}${row.counted ? "" : ", set aside"}` : null}</span></td>
    </tr>
  );
}

function Lines({ stage, reads, timeZone }: { stage: Stage; reads: Row[]; timeZone: string }) {
  const shown = reads.slice(-(LINES[stage] - ROOM));
  const left = reads.length - shown.length;
  const next = (reads.at(-1)?.number ?? 0) + 1;
  const free = Array.from({ length: LINES[stage] - shown.length - (left > 0 ? 1 : 0) }, (_, i) => next + i);
  return (
    <section>
      <h2>{TITLE[stage]}</h2>
      <table className="print-table read-lines">
        <colgroup>{[9, 24, 12, 22, 10, 28, 57].map((width, i) => <col key={i} style={{ width: `${width}mm` }} />)}<col /></colgroup>
        <thead><tr><th scope="col">{WORD[stage]}</th><th scope="col">Day, time</th><th scope="col">Seating</th><th scope="col">Tool, adapter</th><th scope="col">Volt</th><th scope="col">CRC-32</th><th scope="col">SHA-256, first 8 and last 8</th><th scope="col">By</th></tr></thead>
        <tbody>
          {left > 0 ? <tr><td colSpan={8}>{countOf(left, "earlier read")} stand on the chip’s page.</td></tr> : null}
          {shown.map((row) => <Line key={row.number} row={row} number={row.number} timeZone={timeZone} />)}
          {free.map((number) => <Line key={number} row={null} number={number} timeZone={timeZone} />)}
        </tbody>
      </table>
    </section>
  );
}

/** A4, one a chip: for benches without a screen. */
export function ReadSheet({ sheet, workshop, policy, timeZone }: { sheet: ReadSheetView; workshop: string; policy: Policy; timeZone: string }) {
  const original = sheet.board === "original";
  return (
    <Sheet paper="a4" label={`Read sheet of ${sheet.designator}`}>
      <div className="sheet-rows">
        <PrintHead workshop={workshop} title={`Read sheet, ${sheet.designator} of the ${sheet.board}`} refChecked={sheet.refChecked} note={`Drive ${sheet.driveLetter}, ${boardName(sheet)}`} />
        <dl className="print-facts">
          <Fact name="Size of the image" wide="w3">{sizeText(sheet.sizeBytes)}, {countOf(sheet.sizeBytes, "byte")}</Fact>
          <Fact name="Supply" wide="w3">{sheet.supplyMillivolts === null ? "unknown: look it up first" : `${sheet.supplyMillivolts / 1000} V`}</Fact>
          <Fact name="Package" wide="w3">{sheet.package ?? "not recorded"}</Fact>
          <Fact name="Marking" wide="w3">{sheet.marking ?? "not recorded"}</Fact>
        </dl>
        <div className="grid grid-cols-2 gap-6">
          <Cautions of={CAUTIONS[sheet.board]} />
          <div className="grid content-start gap-1">
            <p>{original ? `Needed: ${countOf(policy.reads, "equal read")} in ${countOf(policy.seatings, "seating")}. ` : `Needed: two equal reads before the write; after it ${countOf(policy.readBacks, "equal read-back")} in ${countOf(policy.readBackSeatings, "seating")}. `}
              A seating is one time the clip or chip was put on: A, B, C. Two equal reads are no proof: a clip that sits wrong gives the same wrong image every time.</p>
            {sheet.encrypted ? <Cautions of={["encrypted"]} /> : null}
          </div>
        </div>
        {sheet.stages.map(({ stage, reads }) => <Lines key={stage} stage={stage} reads={reads} timeZone={timeZone} />)}
        <div className="foot">Upload every file as it is; nothing is trimmed. The digests written here are compared with those of the uploaded files. <span className="cap">Entered by, on:</span></div>
      </div>
    </Sheet>
  );
}
