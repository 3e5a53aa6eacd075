import type { MarkKind } from "@/components/ui/mark";
import { sizeText } from "@/lib/core/quantity";
import type { ShelfChip, ShelfRow, ShelfState } from "@/lib/core/shelf";
import type { Bus } from "@/lib/core/words";

export const STATE_MARK: Record<ShelfState, MarkKind> = { "on-shelf": "ok", reserved: "note", taken: "done", retired: "aside" };

export const BUS_OPTIONS: readonly { value: Bus | ""; label: string }[] = [
  { value: "", label: "Not known" }, { value: "spi", label: "SPI" }, { value: "i2c", label: "I2C" }, { value: "microwire", label: "Microwire" }, { value: "other", label: "Other" },
];

/** "SPI, 512 KiB, SOIC-8, A7 0442 K": what is known of a chip beside its designator. */
export function chipFacts(chip: ShelfChip): string {
  const bus = BUS_OPTIONS.find((option) => option.value === (chip.bus ?? ""));
  return [chip.bus && bus?.label, chip.sizeBytes === null ? null : sizeText(chip.sizeBytes), chip.package, chip.marking].filter(Boolean).join(", ") || "nothing else known";
}

/** "Reserved for 26-0042", "Taken for 26-0042, Drive A" */
export function stateWords(row: Pick<ShelfRow, "state" | "reservedFor" | "taken" | "retired">): string {
  if (row.state === "taken") return row.taken ? `Taken for ${row.taken.ref}, Drive ${row.taken.letter}` : "Taken";
  if (row.state === "reserved") return `Reserved for ${row.reservedFor?.ref ?? ""}`;
  return row.state === "retired" ? "Retired" : "On the shelf";
}
