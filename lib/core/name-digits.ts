import { sizeText } from "./quantity";

/** What the digits of a chip's name can mean: shown beside the size field, never filled in by itself. */
export interface NameReading {
  kind: "25-series flash" | "25-series EEPROM" | "24-series EEPROM" | "93-series EEPROM";
  digits: string;
  bytes: number;
  /** how the digits count */
  meaning: string;
}

const MBIT = 131_072;
const KBIT = 128;

interface Family {
  kind: NameReading["kind"];
  series: string;
  unit: "Mbit" | "Kbit";
  /** digits to their number of bits, in the unit */
  digits: Record<string, number>;
}

/** From memory of data-sheet-class facts (trade/CHECK-VALUES.md A.6). The trap: flash counts Mbit, EEPROM Kbit. */
export const NAME_FAMILIES: readonly Family[] = [
  { kind: "25-series flash", series: "25", unit: "Mbit", digits: { "05": 0.5, "10": 1, "20": 2, "40": 4, "80": 8, "16": 16, "32": 32, "64": 64, "128": 128, "256": 256, "512": 512 } },
  { kind: "25-series EEPROM", series: "25", unit: "Kbit", digits: { "010": 1, "020": 2, "040": 4, "080": 8, "160": 16, "320": 32, "640": 64, "128": 128, "256": 256, "512": 512 } },
  { kind: "24-series EEPROM", series: "24", unit: "Kbit", digits: { "01": 1, "02": 2, "04": 4, "08": 8, "16": 16, "32": 32, "64": 64, "128": 128, "256": 256, "512": 512 } },
  { kind: "93-series EEPROM", series: "93", unit: "Kbit", digits: { "46": 1, "56": 2, "66": 4, "76": 8, "86": 16 } },
];

const NAME = /(24|25|93)([A-Z]{0,4})(\d{2,4})(?!\d)/i;

/** All readings of a marking, smallest first; none when it follows none of the families. */
export function nameReadings(marking: string): NameReading[] {
  const [, series, , digits] = NAME.exec(marking.replace(/\s+/g, "")) ?? [];
  if (digits === undefined) return [];
  return NAME_FAMILIES.filter((family) => family.series === series && Object.hasOwn(family.digits, digits)).map(({ kind, unit, digits: table }) => {
    const bits = table[digits];
    return { kind, digits, bytes: bits * (unit === "Mbit" ? MBIT : KBIT), meaning: bits < 1 ? "512 Kbit" : `${bits} ${unit}` };
  }).sort((a, b) => a.bytes - b.bytes);
}

/** The help as one sentence, or null when the marking follows none of the families. */
export function nameHelp(marking: string): string | null {
  const readings = nameReadings(marking);
  if (readings.length === 0) return null;
  const each = readings.map((one) => `${sizeText(one.bytes)} if it is a ${one.kind} (${one.digits} = ${one.meaning})`);
  if (readings.length === 1) return `The name suggests ${each[0]}. Check it against the chip's id or table.`;
  return `The name can mean ${each.join(" or ")}. The name alone can't tell: ask the chip for its id or table.`;
}
