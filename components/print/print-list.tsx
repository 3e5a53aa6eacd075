import Link from "next/link";
import { boardName } from "@/lib/core/board-name";
import type { CaseView } from "@/lib/views";
import { printAddress, PRINTED_WORDS } from "./print-words";

interface Line {
  href: string;
  label: string;
  note?: string;
}

function Lines({ lines, none }: { lines: readonly Line[]; none: string }) {
  if (lines.length === 0) return <p className="text-ink-2">{none}</p>;
  return <ul className="grid gap-1">{lines.map((line) => <li key={line.href} className="flex flex-wrap gap-x-3 py-1"><Link href={line.href}>{line.label}</Link>{line.note ? <span className="text-ink-2">{line.note}</span> : null}</li>)}</ul>;
}

/** Everything that can be printed of a case. */
export function PrintList({ view }: { view: CaseView }) {
  const { id, drives } = view;
  const boards = drives.flatMap((drive) => drive.boards.map((board) => ({ drive, board })));
  const chips = boards.flatMap(({ drive, board }) => board.chips.map((chip) => ({ drive, board, chip, where: `of the ${board.role}, Drive ${drive.letter}` })));
  const labels: Line[] = [
    ...(drives.length > 0 ? [{ href: printAddress(id, "labels"), label: "All labels of the case" }] : []),
    ...drives.map((drive) => ({ href: printAddress(id, "labels", drive.id), label: `Drive ${drive.letter}` })),
    ...boards.map(({ drive, board }) => ({ href: printAddress(id, "labels", board.id), label: `${board.role === "original" ? "Original" : "Donor"} board`, note: `${boardName(board)}, Drive ${drive.letter}` })),
    ...chips.map(({ chip, where }) => ({ href: printAddress(id, "labels", chip.id), label: `Tray card of ${chip.designator}`, note: where })),
  ];
  const originals = chips.filter(({ board, chip }) => board.role === "original" && chip.needsTransfer);
  const groups: { title: string; note: string; lines: Line[]; none: string }[] = [
    { ...PRINTED_WORDS["job-ticket"], lines: [{ href: printAddress(id, "job-ticket"), label: "Job ticket" }], none: "" },
    { ...PRINTED_WORDS.receipt, lines: [{ href: printAddress(id, "receipt"), label: "Receipt" }], none: "" },
    { ...PRINTED_WORDS.labels, lines: labels, none: "No drive is recorded yet. Record it; then it gets its label." },
    { ...PRINTED_WORDS["read-sheet"], lines: chips.map(({ chip, where }) => ({ href: printAddress(id, "read-sheet", chip.id), label: `Read sheet of ${chip.designator}`, note: where })), none: "No chip is recorded yet." },
    { ...PRINTED_WORDS["write-ticket"], lines: originals.map(({ chip, where }) => ({ href: printAddress(id, "write-ticket", chip.id), label: `Write ticket of ${chip.designator}`, note: `${where}: ${chip.state.label.toLowerCase()}` })), none: "No chip that needs a transfer is recorded yet." },
    { ...PRINTED_WORDS["return-slip"], lines: [{ href: printAddress(id, "return-slip"), label: "Return slip" }], none: "" },
  ];
  return (
    <div>
      {groups.map((group) => (
        <section key={group.title} className="grid grid-cols-[var(--margin-col)_minmax(0,1fr)] gap-x-6 gap-y-2 border-t border-rule py-5 narrow:grid-cols-[minmax(0,1fr)]">
          <div><h2 className="text-t4 leading-[1.375rem] font-bold">{group.title}</h2><p className="mt-1 text-t2 text-ink-2">{group.note}</p></div>
          <Lines lines={group.lines} none={group.none} />
        </section>
      ))}
    </div>
  );
}
