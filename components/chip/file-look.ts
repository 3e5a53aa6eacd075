import { sizeText } from "@/lib/core/quantity";
import { addressesOf, FormatError } from "@/lib/core/text-format";
import type { Format } from "@/lib/core/words";
import { MAX_IMAGE_BYTES } from "@/lib/limits";

export const FORMAT_WORD: Record<Format, string> = { "raw": "Raw binary", "intel-hex": "Intel HEX text", "s-record": "S-record text" };
export const FORMAT_OPTIONS = (["raw", "intel-hex", "s-record"] as const).map((value) => ({ value, label: FORMAT_WORD[value] }));

/** What a dropped file looks like: only ever a proposal, which a person takes up. */
export interface FileLook {
  file: File;
  looks: Format;
  /** "its name ends in .hex and its first line begins with a colon" */
  because: string;
  /** lowest and highest address that the text gives; null for raw files and for a text that gives none */
  addresses: { first: number; last: number } | null;
  /** why the text can't be used as it is */
  problem: string | null;
}

const FIRST_BYTES = 96;
const ENDINGS: readonly [RegExp, Format][] = [[/\.(hex|ihex|ihx)$/i, "intel-hex"], [/\.(s19|s28|s37|srec|srecord|mot)$/i, "s-record"]];
const BEGINS: Record<Exclude<Format, "raw">, { first: RegExp; words: string }> = {
  "intel-hex": { first: /^:[0-9A-Fa-f]{10,}/, words: "its first line begins with a colon" },
  "s-record": { first: /^S[0-9][0-9A-Fa-f]{6,}/, words: "its first line begins with S and a digit" },
};

/** By the ending of the name and by the first characters. The characters decide: a name is soon changed. */
export function formatByLook(name: string, head: string): { looks: Format; because: string } {
  const ending = ENDINGS.find(([pattern]) => pattern.test(name))?.[1];
  for (const looks of ["intel-hex", "s-record"] as const) {
    if (!BEGINS[looks].first.test(head)) continue;
    const end = ending === looks ? `its name ends in ${name.slice(name.lastIndexOf("."))} and ` : "";
    return { looks, because: `${end}${BEGINS[looks].words}` };
  }
  if (ending) return { looks: "raw", because: `its name ends in ${name.slice(name.lastIndexOf("."))}, but its first bytes are no such text` };
  return { looks: "raw", because: "its first bytes are no text of records" };
}

export type TextLook = Pick<FileLook, "addresses" | "problem">;
export type WalkText = (file: File, format: Exclude<Format, "raw">) => Promise<TextLook>;

export const CANT_BE_READ = "This file can't be read. It may have changed or moved since it was chosen; choose it again.";

/** The addresses of a text, or why it can't be walked. Takes about a second for 64 MiB. */
export function addressesIn(format: Exclude<Format, "raw">, bytes: Uint8Array): TextLook {
  try {
    const addresses = addressesOf(format, bytes);
    return { addresses, problem: addresses ? null : "It gives no data at all. Save the image again." };
  } catch (error) {
    if (!(error instanceof FormatError)) throw error;
    return { addresses: null, problem: `${error.message}` };
  }
}

/** `walk` gives the addresses of a text; the page walks in a thread of its own (walk-text.ts). */
export async function lookAt(file: File, walk: WalkText): Promise<FileLook> {
  try {
    const head = new TextDecoder("latin1").decode(await file.slice(0, FIRST_BYTES).arrayBuffer());
    const seen = formatByLook(file.name, head);
    if (seen.looks === "raw") return { file, ...seen, addresses: null, problem: null };
    if (file.size > MAX_IMAGE_BYTES) return { file, ...seen, addresses: null, problem: `It is larger than ${sizeText(MAX_IMAGE_BYTES)}. Save the image as raw binary.` };
    return { file, ...seen, ...await walk(file, seen.looks) };
  } catch (error) {
    if (!(error instanceof DOMException)) throw error;
    return { file, looks: "raw", because: "it could not be looked into", addresses: null, problem: CANT_BE_READ };
  }
}

/** An address of a text, at least 4 digits: 0x0000, 0x8000000. */
export function textAddress(n: number): string {
  return `0x${n.toString(16).toUpperCase().padStart(4, "0")}`;
}

/** Why a file must not be sent as the form stands, in words; null when it may. */
export function heldBecause(look: FileLook, format: Format, window: { base: number; size: number } | null): string | null {
  if (look.problem && look.looks === format) return look.problem;
  if (look.looks !== format) return `Looks like ${look.looks === "raw" ? "raw binary" : FORMAT_WORD[look.looks]}: ${look.because}. Choose the format, then send.`;
  if (format === "raw" || !look.addresses) return null;
  const { first, last } = look.addresses;
  if (!window) return `Gives addresses ${textAddress(first)} to ${textAddress(last)}. Say base, size and fill, then send.`;
  const end = window.base + window.size - 1;
  if (first >= window.base && last <= end) return null;
  return `Gives addresses ${textAddress(first)} to ${textAddress(last)}, and the image would run from ${textAddress(window.base)} to ${textAddress(end)}. Check base and size.`;
}
