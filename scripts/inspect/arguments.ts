import { parseArgs } from "node:util";
import { MAX_EXPANDED_BYTES } from "@/lib/core/text-format";
import { FORMATS, type Format } from "@/lib/core/words";

export interface Asked {
  files: string[];
  /** bytes; null: each image's own size */
  size: number | null;
  format: Format;
  base: number;
  fill: number;
  json: boolean;
}

/** A sentence for whoever typed the command; it ends with 2. */
export class NotInspected extends Error {}

export const USAGE = `npm run inspect -- FILE… [--size BYTES] [--format raw|intel-hex|s-record] [--base N] [--fill N] [--json]

Prints digests, findings, comparisons and the verdict on reads of one chip. Nothing is stored, no server is needed.
  --size BYTES   the chip's size, such as 524288 or 0x80000
  --format       what the files are: raw images (default) or texts
  --base N       for texts: address of the image's first byte (default 0)
  --fill N       for texts: value of bytes that the text leaves out (default 0xFF)
  --json         for programs; with "npm run --silent" nothing else stands on standard output
Ends with 0: equal and nothing stands against them. 1: something stands against them. 2: could not be read.`;

function wholeNumber(option: string, text: string, least: number, most: number): number {
  const n = /^(0x[0-9a-f]+|[0-9]+)$/i.test(text) ? Number(text) : NaN;
  if (!(n >= least && n <= most)) throw new NotInspected(`--${option} ${text} is no number from ${least} to ${most}. Write it like 4096 or 0x1000.`);
  return n;
}

function parsed(words: string[]) {
  try {
    return parseArgs({
      args: words, allowPositionals: true,
      options: { size: { type: "string" }, format: { type: "string" }, base: { type: "string" }, fill: { type: "string" }, json: { type: "boolean" }, help: { type: "boolean", short: "h" } },
    });
  } catch (error) {
    // the parser's own first sentence names the option
    const [reason] = error instanceof Error ? error.message.split(". ") : ["The options can't be read"];
    throw new NotInspected(`${reason.replace(/\.?$/, ".")}\n${USAGE}`);
  }
}

/** Null when only help was asked for. Throws NotInspected. */
export function askedFor(words: string[]): Asked | null {
  const { values, positionals } = parsed(words);
  if (values.help) return null;
  if (positionals.length === 0) throw new NotInspected(`Name one or more files.\n${USAGE}`);
  const format = FORMATS.find((one) => one === (values.format ?? "raw"));
  if (!format) throw new NotInspected(`--format ${values.format} isn't known. Choose ${FORMATS.join(", ")}.`);
  if (format === "raw" && (values.base ?? values.fill) !== undefined) throw new NotInspected("--base and --fill go with --format intel-hex or s-record. Leave them out for raw images.");
  return {
    files: positionals, format, json: values.json ?? false,
    size: values.size === undefined ? null : wholeNumber("size", values.size, 1, MAX_EXPANDED_BYTES),
    base: wholeNumber("base", values.base ?? "0", 0, 0xffff_ffff),
    fill: wholeNumber("fill", values.fill ?? "0xFF", 0, 255),
  };
}
