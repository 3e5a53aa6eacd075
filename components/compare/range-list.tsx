"use client";

import { buttonClass } from "@/components/ui/button";
import { Icon } from "@/components/ui/icon";
import { countOf, withCommas } from "@/lib/core/quantity";
import { rangeText } from "@/lib/core/strip";
import type { Range } from "@/lib/core/words";

const SHOWN = 200;

/** The first 200 ranges; N and P go on past them. */
export function RangeList({ ranges, truncated, current, sizeBytes, csv, onGo }: { ranges: readonly Range[]; truncated: boolean; current: number; sizeBytes: number; csv: string | null; onGo(at: number): void }) {
  return (
    <nav aria-label="Ranges that differ" className="self-start">
      <h2 className="pb-1.5 text-t3 font-bold">Ranges that differ <span className="font-normal text-ink-2">{truncated ? `${withCommas(ranges.length)} and more` : withCommas(ranges.length)}</span></h2>
      {ranges.length === 0 ? <p className="text-t2 text-ink-2">None: the images are equal.</p> : (
        <ol className="ranges">
          {ranges.slice(0, SHOWN).map((range, i) => (
            <li key={range.start}>
              <button type="button" aria-current={i === current ? "true" : undefined} onClick={() => onGo(range.start)}>
                <code>{rangeText(range.start, range.length, sizeBytes)}</code><span className="text-t2 whitespace-nowrap">{withCommas(range.length)} B</span>
              </button>
            </li>
          ))}
        </ol>
      )}
      {ranges.length > SHOWN ? <p className="pt-2 text-t2 text-ink-2">The first {SHOWN} are listed; {countOf(ranges.length - SHOWN, "more range")} {ranges.length - SHOWN === 1 ? "follows" : "follow"} with “Next difference”.</p> : null}
      {truncated ? <p className="pt-2 text-t2 text-ink-2">Past the first {withCommas(ranges.length)} ranges only the strips show where bytes differ.</p> : null}
      {csv && ranges.length > 0 ? <p className="no-print pt-2.5"><a href={csv} download className={buttonClass({ size: "small" })}><Icon name="down" />Save as CSV</a></p> : null}
    </nav>
  );
}
