import { fromHex, toHex } from "./digest";
import { sizeText } from "./quantity";
import { parseSfdp, SfdpError } from "./sfdp";
import type { SizeSource } from "./words";

/** The three bytes that a serial flash answers to 9Fh. No maker is ever inferred: an id names one of several. */
export interface ChipIdFacts {
  /** "12 40 13" */
  text: string;
  answered: boolean;
  /** the first byte has odd parity, as every assigned one has */
  plausible: boolean;
  /** by common practice; the technician confirms, the chip's own table and its marking go before */
  proposedBytes: number | null;
  /** what was found, then what to do */
  sentence: string;
}

/** Hex as people paste it: pairs with or without blanks, commas, colons, 0x. Throws a RangeError otherwise. */
export function pastedHex(text: string): Uint8Array<ArrayBuffer> {
  return fromHex(text.replace(/\b0x/gi, "").replace(/[\s,:;-]+/g, ""));
}

const FEWEST_CODE = 0x10;
const MOST_CODE = 0x19;
/** Where some families go on for 64 MiB (from memory of data sheets: only ever a proposal). */
const CODE_64_MIB = 0x20;

function proposed(code: number): number | null {
  if (code >= FEWEST_CODE && code <= MOST_CODE) return 2 ** code;
  return code === CODE_64_MIB ? 2 ** 26 : null;
}

function ones(byte: number): number {
  return byte.toString(2).replaceAll("0", "").length;
}

/** Throws a RangeError when `bytes` are not three. */
export function chipIdFacts(bytes: Uint8Array): ChipIdFacts {
  if (bytes.length !== 3) throw new RangeError("An id has three bytes, such as 12 40 13. Enter all three.");
  const text = (toHex(bytes).match(/../g) ?? []).join(" ").toUpperCase();
  const answered = !(bytes[0] === bytes[1] && bytes[1] === bytes[2]);
  const plausible = answered && ones(bytes[0]) % 2 === 1;
  const proposedBytes = plausible ? proposed(bytes[2]) : null;
  return { text, answered, plausible, proposedBytes, sentence: sentenceOf(text, answered, plausible, proposedBytes) };
}

function sentenceOf(text: string, answered: boolean, plausible: boolean, bytes: number | null): string {
  if (!answered) return `Id ${text}: the chip didn't answer. Check pin 1, supply and clip, and ask again.`;
  if (!plausible) return `Id ${text}: no maker has such a first byte, so it looks like a bad contact. Re-seat the clip and ask again.`;
  if (bytes === null) return `Id ${text}: plausible, but it doesn't tell a size. Take the size from the marking.`;
  return `Id ${text}: plausible; by common practice ${sizeText(bytes)}. Confirm it against the marking.`;
}

export interface SizeContradiction {
  source: "id" | "sfdp";
  /** what the chip itself says */
  bytes: number;
  /** for the finding `size-contradicts` */
  message: string;
  advice: string;
}

const SOURCE_WORDS: Record<SizeSource, string> = { marking: "by its marking", id: "by its id", sfdp: "by its own table", typed: "as typed" };

/**
 * F32: what the chip says of its size against the size that is recorded. The chip's own table goes before its id; what
 * can't be read or tells no size contradicts nothing. `id` and `sfdp` as hex text, null when not taken.
 */
export function sizeContradiction(chip: { sizeBytes: number; sizeSource: SizeSource }, id: string | null, sfdp: string | null): SizeContradiction | null {
  const told = sizeTold(id, sfdp);
  if (told === null || told.bytes === chip.sizeBytes) return null;
  const who = told.source === "sfdp" ? "Its own table" : "Its id";
  const trust = told.source === "sfdp" ? "The table is surer than an id." : "An id gives a size by common practice only.";
  return {
    ...told,
    message: `${who} says ${sizeText(told.bytes)}, and the chip is recorded with ${sizeText(chip.sizeBytes)} ${SOURCE_WORDS[chip.sizeSource]}.`,
    advice: `${trust} Look at the marking, then correct the size and read again, or say why the recorded size stands.`,
  };
}

function sizeTold(id: string | null, sfdp: string | null): { source: "id" | "sfdp"; bytes: number } | null {
  try {
    if (sfdp) return { source: "sfdp", bytes: parseSfdp(pastedHex(sfdp)).sizeBytes };
  } catch (error) {
    // an unreadable table says nothing; the id may still
    if (!(error instanceof SfdpError || error instanceof RangeError)) throw error;
  }
  try {
    const bytes = id ? chipIdFacts(pastedHex(id)).proposedBytes : null;
    return bytes === null ? null : { source: "id", bytes };
  } catch (error) {
    if (!(error instanceof RangeError)) throw error;
    return null;
  }
}
