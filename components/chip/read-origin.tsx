import { madeOf, votesAnchor } from "@/components/composite/composite-words";
import { FindingLine } from "@/components/ui/finding-line";
import { withCommas } from "@/lib/core/quantity";
import type { ReadView } from "@/lib/views";
import { FORMAT_WORD, textAddress } from "./file-look";

/** What took the image: reader and adapter, for a text also how it became one; for a composite, the reads it was made of. */
export function ReadOrigin({ read }: { read: ReadView }) {
  if (read.derived) {
    const { disputedBytes, weak, constructed } = read.derived;
    const unsure = [weak > 0 ? `${withCommas(weak)} weak` : "", constructed > 0 ? `${withCommas(constructed)} constructed` : ""].filter(Boolean).join(", ");
    return (
      <>
        <FindingLine kind={weak + constructed > 0 ? "caution" : "note"}>{madeOf(read.derived)}. {withCommas(disputedBytes)} disputed{unsure ? `, ${unsure}` : ""}.</FindingLine>
        <a href={`#${votesAnchor(read)}`} className="no-print">See the votes</a>
      </>
    );
  }
  return (
    <>
      {[read.reader, read.adapter].filter(Boolean).join(", ")}
      {read.source ? <span className="mt-0.5 block text-t2 text-ink-2">From {FORMAT_WORD[read.format]}, base <code className="whitespace-nowrap">{textAddress(read.source.base)}</code>, fill <code>{read.source.fill.toString(16).toUpperCase().padStart(2, "0")}</code></span> : null}
    </>
  );
}
