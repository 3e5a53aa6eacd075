import { Button } from "@/components/ui/button";
import { Select } from "@/components/ui/select";
import { readTitle } from "@/lib/core/derived";
import { seatingLetter, type Stage } from "@/lib/core/words";
import type { ReadView } from "@/lib/views";

/** Two or three reads of one stage: a plain form, so that the address of the page says what is shown. */
export function ChooseReads({ reads, stage, chosen }: { reads: readonly ReadView[]; stage: Stage; chosen: readonly number[] }) {
  const options = reads.filter((r) => r.stage === stage).map((r) => ({ value: String(r.number), label: `${readTitle(r)}${r.derived ? "" : `, seating ${seatingLetter(r.seating)}`}${r.counted ? "" : ", set aside"}` }));
  return (
    <form className="no-print flex flex-wrap items-end gap-2" aria-label="Choose other reads">
      <input type="hidden" name="stage" value={stage} />
      <Select key={`a${chosen[0]}`} quiet label="First read" name="a" defaultValue={String(chosen[0])} options={options} />
      <span className="self-center text-ink-2">and</span>
      <Select key={`b${chosen[1]}`} quiet label="Second read" name="b" defaultValue={String(chosen[1])} options={options} />
      {options.length > 2 ? (
        <>
          <span className="self-center text-ink-2">and</span>
          <Select key={`c${chosen[2] ?? ""}`} quiet label="Third read" name="c" defaultValue={String(chosen[2] ?? "")} options={[{ value: "", label: "no third" }, ...options]} />
        </>
      ) : null}
      <Button type="submit">Compare</Button>
    </form>
  );
}
