import Link from "next/link";
import type { ReactNode } from "react";
import { Digest } from "@/components/ui/digest";
import { FindingLine } from "@/components/ui/finding-line";
import { Mark } from "@/components/ui/mark";
import { DesignatorPlate } from "@/components/ui/plate";
import { exactText, momentText } from "@/components/ui/times";
import { sizeText } from "@/lib/core/quantity";
import type { SavedContent, ShelfPage, ShelfRow } from "@/lib/core/shelf";
import { chipFacts, STATE_MARK } from "./shelf-words";

const none = (words: string) => <span className="text-ink-3">{words}</span>;

/** Where the board stands, as one line with links. */
export function ShelfStateLine({ board, timeZone }: { board: ShelfRow; timeZone: string }) {
  const { state, taken, reservedFor, retired } = board;
  return (
    <FindingLine kind={STATE_MARK[state]}>
      {state === "taken" && taken ? <>Taken on {momentText(taken.at, timeZone)} for <Link href={`/drives/${taken.driveId}`}>Drive {taken.letter} of case {taken.ref}</Link>. It is that drive’s donor board.</>
        : state === "reserved" && reservedFor ? <>Reserved for case <Link href={`/cases/${reservedFor.caseId}`}>{reservedFor.ref}</Link>. Only a drive of that case can take it.</>
        : state === "retired" && retired ? <>Retired on {momentText(retired.at, timeZone)}: {retired.reason}</>
        : <>On the shelf, for any drive that it fits.</>}
    </FindingLine>
  );
}

export function ShelfFacts({ board }: { board: ShelfRow }) {
  const facts: [string, ReactNode][] = [
    ["Board number", <span key="n" className="font-mono">{board.boardNumber}</span>],
    ["Revision", board.revision ? <span key="r" className="font-mono">{board.revision}</span> : none("none on record")],
    ["Main controller", board.controllerMarking ? <span key="c" className="font-mono">{board.controllerMarking}</span> : none("not read")],
    ["Motor driver", board.motorDriverMarking ? <span key="m" className="font-mono">{board.motorDriverMarking}</span> : none("not read")],
    ["Origin", board.origin ?? none("not said")],
    ["Condition", board.condition ? <span key="d" className="whitespace-pre-line">{board.condition}</span> : none("not said")],
    ["Place", board.place ?? none("not said")],
    ["Note", board.note ? <span key="o" className="whitespace-pre-line">{board.note}</span> : none("none")],
  ];
  return (
    <dl className="grid grid-cols-[max-content_minmax(0,1fr)] gap-x-6 gap-y-1.5">
      {facts.map(([name, value]) => <div key={name} className="contents"><dt className="text-ink-2">{name}</dt><dd className="[overflow-wrap:anywhere]">{value}</dd></div>)}
    </dl>
  );
}

export function ShelfChips({ board }: { board: ShelfRow }) {
  if (board.chips.length === 0) return <p className="text-ink-2">No chip is on record. Whoever takes the board records its chips on the drive.</p>;
  return <ul className="grid gap-2">{board.chips.map((chip) => <li key={chip.designator} className="flex flex-wrap items-center gap-3"><DesignatorPlate designator={chip.designator} board="donor" /><span>{chipFacts(chip)}</span></li>)}</ul>;
}

/** The content that a donor had before it was written: it stays, and can be found by its digest. */
export function SavedContents({ saved, timeZone }: { saved: readonly SavedContent[]; timeZone: string }) {
  if (saved.length === 0) return <p className="text-ink-2">Nothing is saved yet. The donor’s own content is read twice before anything is written to it.</p>;
  return (
    <table className="ruled lines">
      <caption className="sr-only">Content saved from this board</caption>
      <thead><tr><th scope="col">Read</th><th scope="col">Chip</th><th scope="col">SHA-256</th><th scope="col" className="num">Size</th><th scope="col">Stored</th><th scope="col">State</th></tr></thead>
      <tbody>
        {saved.map((read) => (
          <tr key={read.readId} className={read.counted ? "" : "is-aside"}>
            <th scope="row"><Link href={`/chips/${read.chipId}`}>{read.name}</Link></th>
            <td><DesignatorPlate designator={read.designator} board="donor" /></td>
            <td data-l="SHA-256"><Digest sha256={read.sha256} /></td>
            <td data-l="Size" className="num">{sizeText(read.sizeBytes)}</td>
            <td data-l="Stored" className="whitespace-nowrap">{momentText(read.storedAt, timeZone)}</td>
            <td><Mark kind={read.counted ? "ok" : "aside"} className="[--hole:var(--paper)]" /> {read.counted ? "Counted" : "Set aside"}</td>
          </tr>
        ))}
      </tbody>
    </table>
  );
}

export function ShelfHistory({ history, timeZone }: { history: ShelfPage["history"]; timeZone: string }) {
  return (
    <ol className="grid" aria-label="History of this board">
      {history.map((entry) => (
        <li key={entry.seq} className="grid grid-cols-[13rem_minmax(0,1fr)] gap-x-4 gap-y-0.5 border-b border-rule py-2 phone:grid-cols-1">
          <span className="text-t2 text-ink-2">{entry.at ? exactText(entry.at, timeZone) : "no time"}</span>
          <span className="[overflow-wrap:anywhere]">{entry.sentence} <span className="text-t2 text-ink-2">{entry.who}, entry {entry.seq}</span></span>
        </li>
      ))}
    </ol>
  );
}
