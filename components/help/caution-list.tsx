import { Note } from "@/components/ui/note";
import { CAUTIONS, type CautionKey } from "./cautions";
import { See } from "./prose";

/** The cautions of one step. They are the same sentences everywhere. */
export function CautionList({ of }: { of: readonly CautionKey[] }) {
  return (
    <Note kind="caution" title="Before you do this" className="mb-5 max-w-[53ch] text-t3">
      <ul className="mt-1 grid gap-1.5">
        {of.map((key) => <li key={key}><b>{CAUTIONS[key].title}</b> {CAUTIONS[key].text}</li>)}
      </ul>
      <p className="mt-2">Your local rules and your workshop’s own licensed practice come before anything that stands here. <See topic="cautions">All cautions</See></p>
    </Note>
  );
}
