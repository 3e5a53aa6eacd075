import { Note } from "@/components/ui/note";
import { NO_CHIP_TEXT, NO_CHIP_TITLE } from "@/lib/core/no-chip";

/** Where a drive ends whose unique data lies inside the main controller. */
export function NoChipToMove({ className }: { className?: string }) {
  return (
    <Note kind="note" title={NO_CHIP_TITLE} className={className}>
      <div className="grid max-w-[78ch] gap-2 pt-1">{NO_CHIP_TEXT.map((text) => <p key={text}>{text}</p>)}</div>
    </Note>
  );
}
