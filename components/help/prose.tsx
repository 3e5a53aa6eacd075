import Link from "next/link";
import type { ReactNode } from "react";
import { Section } from "@/components/ui/section";
import type { TopicKey } from "./topics";

/** A part of a help page: title in the margin, prose of a readable measure beside it. */
export function Part({ title, note, id, first, children }: { title: string; note?: ReactNode; id?: string; first?: boolean; children: ReactNode }) {
  return <Section title={title} note={note} id={id} first={first}><div className="grid max-w-[53ch] gap-3 text-t4">{children}</div></Section>;
}

/** A part that is a table: as wide as the page. */
export function WidePart({ title, note, id, children }: { title: string; note?: ReactNode; id?: string; children: ReactNode }) {
  return <Section title={title} note={note} id={id}>{children}</Section>;
}

export function Steps({ children }: { children: ReactNode }) {
  return <ol className="grid list-decimal gap-2 pl-6">{children}</ol>;
}

export function Points({ children }: { children: ReactNode }) {
  return <ul className="grid list-disc gap-2 pl-6">{children}</ul>;
}

/** A fact of the trade from memory: nobody here can name a source for it. */
export function Unsourced() {
  return <span className="text-t2 text-ink-2"> (common practice, no source)</span>;
}

export function See({ topic, at, children }: { topic: TopicKey; at?: string; children: ReactNode }) {
  return <Link href={`/help/${topic}${at ? `#${at}` : ""}`}>{children}</Link>;
}

export interface HelpRow {
  key: string;
  cells: readonly ReactNode[];
}

/** A ruled table whose rows become lines on a phone; the first cell of a row is its head. */
export function HelpTable({ caption, head, rows }: { caption: string; head: readonly string[]; rows: readonly HelpRow[] }) {
  return (
    <table className="ruled lines">
      <caption className="sr-only">{caption}</caption>
      <thead><tr>{head.map((word) => <th key={word} scope="col">{word}</th>)}</tr></thead>
      <tbody>
        {rows.map(({ key, cells: [first, ...others] }) => (
          <tr key={key}>
            <th scope="row" className="w-56 min-w-[16ch] !whitespace-normal phone:w-auto phone:!flex-[0_0_100%]">{first}</th>
            {others.map((cell, i) => <td key={head[i + 1]} className="l-row max-w-[53ch]">{cell}</td>)}
          </tr>
        ))}
      </tbody>
    </table>
  );
}

/** Commands as they are typed: long lines are scrolled, never wrapped into another meaning. */
export function Commands({ label, children }: { label: string; children: string }) {
  return <pre tabIndex={0} role="region" aria-label={label} className="max-w-full overflow-x-auto bg-well px-3 py-2.5 text-t2 leading-[1.25rem] print:whitespace-pre-wrap print:border"><code>{children}</code></pre>;
}
