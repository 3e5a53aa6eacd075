import { parse } from "csv-parse/sync";
import { stringify } from "csv-stringify/sync";
import { allow } from "@/lib/commands/refuse";
import { SHELF_STATE_WORD, shelfBytes, type ShelfChip, type ShelfRow } from "@/lib/core/shelf";
import type { Actor } from "@/lib/core/words";
import { AppError } from "@/lib/errors";
import { MAX_CSV_ROWS } from "@/lib/limits";
import type { ShelfListInput } from "@/lib/schemas/shelf";
import { type CsvColumn, csvStream } from "./csv";
import { shelfList } from "./shelf";

/** One chip after the other with a semicolon between, its facts with commas: "U12,spi,524288,SOIC-8,A7 0442 K;U3,i2c,8192". */
export function chipsText(chips: readonly ShelfChip[]): string {
  const records = chips.map((chip) => {
    const facts = [chip.designator, chip.bus ?? "", chip.sizeBytes === null ? "" : String(chip.sizeBytes), chip.package ?? "", chip.marking ?? ""];
    return facts.slice(0, facts.findLastIndex((fact) => fact !== "") + 1);
  });
  return stringify(records, { delimiter: ",", record_delimiter: ";", eof: false });
}

/** The same read back; sizes also as "512 KiB" or "1 MiB". What does not fit is left for the schema to say. */
export function chipsFrom(text: string): Record<string, unknown>[] {
  const records = parse(text, { delimiter: ",", record_delimiter: [";"], trim: true, relax_column_count: true, skip_empty_lines: true }) as string[][];
  return records.map(([designator = "", bus = "", size = "", pack = "", marking = "", ...rest]) => ({
    designator, bus: bus.toLowerCase(), sizeBytes: shelfBytes(size) ?? size, package: pack, marking, ...(rest.some((one) => one !== "") ? { more: rest.join(",") } : {}),
  }));
}

// what csv.ts puts an apostrophe before
const FORMULA = "[=+\\-@\\t\\r\\n\\0\\uFF1D\\uFF0B\\uFF0D\\uFF20]";
const GUARDED = new RegExp(`^'+${FORMULA}`);
const GUARD = new RegExp(`^'(?='*${FORMULA})`);

/** A text that itself begins like a guarded one gets one apostrophe more, so that exactly one comes off again. */
const guard = (text: string | null) => (text !== null && GUARDED.test(text) ? `'${text}` : text);
/** The text of a cell as it was before it was made safe for a spreadsheet. */
export const unguard = (cell: string) => cell.replace(GUARD, "");

/** Only told by the file, never changed by it. */
export const TOLD = {
  state: (row: ShelfRow) => SHELF_STATE_WORD[row.state],
  "taken for": (row: ShelfRow) => (row.taken ? `Drive ${row.taken.letter} of case ${row.taken.ref}` : ""),
  "retired because": (row: ShelfRow) => row.retired?.reason ?? "",
} as const;

/** The columns of a file: how each is called there and in the interface. */
export const FACTS = {
  "board number": "boardNumber", revision: "revision", "controller marking": "controllerMarking", "motor driver marking": "motorDriverMarking", chips: "chips",
  origin: "origin", condition: "condition", place: "place", note: "note", "reserved for": "reservedFor",
} as const;
export const HEADERS = ["number", ...Object.keys(FACTS), ...Object.keys(TOLD)];

const factText = (row: ShelfRow, name: (typeof FACTS)[keyof typeof FACTS]) => (name === "chips" ? chipsText(row.chips) : name === "reservedFor" ? row.reservedFor?.ref ?? null : row[name]);

const columns: CsvColumn<ShelfRow>[] = [
  { header: "number", cell: (row) => row.number },
  ...Object.entries(FACTS).map(([header, name]): CsvColumn<ShelfRow> => ({ header, cell: (row) => guard(factText(row, name)) })),
  ...Object.entries(TOLD).map(([header, text]): CsvColumn<ShelfRow> => ({ header, cell: (row) => guard(text(row)) })),
];

const A_BATCH = 200;

/** The shelf as CSV with the search and filter of the page, by number. Importing it again changes nothing. */
export async function shelfFile(actor: Actor, input: ShelfListInput): Promise<{ fileName: string; stream: ReadableStream<Uint8Array> }> {
  allow(actor, "shelf.read");
  const ask = (page: number) => shelfList(actor, { ...input, sort: "number", order: "asc", page, pageSize: A_BATCH });
  const first = await ask(1);
  if (first.total > MAX_CSV_ROWS) throw new AppError("does-not-fit", `The list has ${first.total.toLocaleString("en")} rows, and a file holds ${MAX_CSV_ROWS.toLocaleString("en")} at most. Narrow it by a search, and save it in parts.`);
  async function* batches() {
    if (first.items.length > 0) yield first.items;
    for (let page = 2; page <= Math.ceil(first.total / A_BATCH); page += 1) {
      const { items } = await ask(page);
      if (items.length > 0) yield items;
    }
  }
  return { fileName: "twinread-donor-shelf.csv", stream: csvStream(columns, batches()) };
}
