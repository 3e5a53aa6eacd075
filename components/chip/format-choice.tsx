import { Select } from "@/components/ui/select";
import type { Format } from "@/lib/core/words";
import { FORMAT_OPTIONS } from "./file-look";

/** As what an image leaves the house: raw unless somebody asks for a text. */
export function FormatChoice({ label, value, quiet, onChoose }: { label: string; value: Format; quiet?: boolean; onChoose(format: Format): void }) {
  return (
    <Select quiet={quiet} className={quiet ? "max-w-[184px]" : ""} label={label} value={value} options={FORMAT_OPTIONS} onChange={(event) => onChoose(event.target.value as Format)}
      hint={value === "raw" ? undefined : "Addresses begin at 0. The digest of the text is not the image’s."} />
  );
}
