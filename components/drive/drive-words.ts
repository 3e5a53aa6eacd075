import type { Bus, SizeSource } from "@/lib/core/words";
import type { BoardView, DriveView } from "@/lib/views";

export const BUS_OPTIONS: readonly { value: Bus; label: string }[] = [
  { value: "spi", label: "SPI" }, { value: "i2c", label: "I2C" }, { value: "microwire", label: "Microwire" }, { value: "other", label: "Other" },
];

export const SIZE_SOURCE_OPTIONS: readonly { value: SizeSource; label: string }[] = [
  { value: "marking", label: "Marking on the chip" }, { value: "id", label: "Id that the chip answers" },
  { value: "sfdp", label: "SFDP table read from the chip" }, { value: "typed", label: "Typed from a data sheet or memory" },
];

/** What names a drive in one line. */
export function driveFacts(drive: Pick<DriveView, "partNumber" | "model" | "serial" | "interface">): string[] {
  return [drive.partNumber, drive.model, drive.serial && `SN ${drive.serial}`, drive.interface].filter((fact): fact is string => Boolean(fact));
}

/** What else is on the label, and whether somebody looked for encryption. */
export function lesserFacts({ capacity, made, firmware, encryption }: Pick<DriveView, "capacity" | "made" | "firmware" | "encryption">): string[] {
  return [capacity, made && `made ${made}`, firmware && `firmware ${firmware}`, encryption === "none" && "not encrypted"].filter((fact): fact is string => Boolean(fact));
}

export function originalOf(drive: Pick<DriveView, "boards">): BoardView | null {
  return drive.boards.find((board) => board.role === "original") ?? null;
}
