import type { z } from "zod";
import { readCaseRef } from "@/lib/core/case-number";
import { type ImportLine, readShelfNumber, SHELF_STATE_WORD, shelfNumber, type ShelfRow } from "@/lib/core/shelf";
import { chipsFrom, FACTS, TOLD } from "@/lib/queries/shelf-file";
import { shelfRows } from "@/lib/queries/shelf-view";
import { type ShelfChange, shelfChange, type ShelfInput, shelfInput } from "@/lib/schemas/shelf";
import { Case, ShelfBoard, type Transaction } from "@/models";
import { shelfChanges } from "./change-shelf-board";
import type { Change } from "./correct-facts";
import type { CsvRow } from "./read-shelf-csv";

/** What a line would do, and what is needed to do it. */
export interface PlannedLine extends ImportLine {
  make?: ShelfInput;
  kept?: Pick<Case, "id" | "ref"> | null;
  change?: { row: ShelfBoard; wanted: ShelfChange["changes"]; found: Change[] };
}

interface Known {
  boards: Map<number, { row: ShelfBoard; view: ShelfRow }>;
  cases: Map<string, Pick<Case, "id" | "ref" | "closedAt">>;
  /** number of the shelf by the line that named it first */
  named: Map<number, number>;
}

/** Looks at every line as the shelf stands now; nothing is changed. */
export async function planShelfImport(rows: readonly CsvRow[], tx: Transaction): Promise<PlannedLine[]> {
  const numbers = rows.flatMap(({ cells }) => readShelfNumber(cells?.number ?? "") ?? []);
  const boards = numbers.length > 0 ? await ShelfBoard.findAll({ where: { number: [...new Set(numbers)] }, transaction: tx }) : [];
  const views = await shelfRows(boards, tx);
  const refs = new Set(rows.flatMap(({ cells }) => refOf(cells?.["reserved for"] ?? "") ?? []));
  const cases = refs.size > 0 ? await Case.findAll({ attributes: ["id", "ref", "closedAt"], where: { ref: [...refs] }, transaction: tx }) : [];
  const known: Known = {
    boards: new Map(boards.map((row, i) => [row.number, { row, view: views[i] }])), cases: new Map(cases.map((one) => [one.ref, one])), named: new Map(),
  };
  return rows.map((row) => planLine(row, known));
}

const refOf = (text: string) => {
  const reading = readCaseRef(text);
  return reading.kind === "ref" ? reading.ref : null;
};

function planLine({ line, cells, count }: CsvRow, known: Known): PlannedLine {
  const refused = (sentence: string, number: string | null = null): PlannedLine => ({ line, result: "refused", number, sentence });
  if (!cells) return refused(`It has ${count} cells, the header has another number. Look for a comma or a quote too many.`);
  const typed = cells.number ?? "";
  if (typed === "") return planNew(line, cells, known);
  const n = readShelfNumber(typed);
  if (n === null) return refused(`“${typed.slice(0, 40)}” is no number of the shelf. Numbers look like D-0012; leave it empty for a new board.`);
  const number = shelfNumber(n);
  const before = known.named.get(n);
  if (before !== undefined) return refused(`${number} stands in line ${before} already. Leave one of the two out.`, number);
  known.named.set(n, line);
  const found = known.boards.get(n);
  return found ? planChange(line, cells, found, known) : refused(`There is no ${number} on the shelf. Leave the number empty for a new board; it gets the next one.`, number);
}

/** The cells of a line as the interface takes them; a column that the file lacks is left out. */
function wantedOf(cells: Record<string, string>): Record<string, unknown> | null {
  try {
    return Object.fromEntries(Object.entries(FACTS).flatMap(([header, name]) => (header in cells ? [[name, name === "chips" ? chipsFrom(cells[header]) : cells[header]]] : [])));
  } catch {
    return null;
  }
}

const BAD_CHIPS = "The chips can't be read. Write them like U12,spi,524288,SOIC-8;U3,i2c,8192: commas within a chip, a semicolon between two.";

function planNew(line: number, cells: Record<string, string>, known: Known): PlannedLine {
  const refused = (sentence: string): PlannedLine => ({ line, result: "refused", number: null, sentence });
  const wanted = wantedOf(cells);
  if (!wanted) return refused(BAD_CHIPS);
  const parsed = shelfInput.safeParse(wanted);
  if (!parsed.success) return refused(sentenceOf(parsed.error));
  const against = againstReserving(parsed.data.reservedFor ?? null, known) ?? againstTold(cells, { state: ["", SHELF_STATE_WORD["on-shelf"], SHELF_STATE_WORD.reserved], "taken for": [""], "retired because": [""] });
  if (against) return refused(against);
  return { line, result: "new", number: null, sentence: `New: ${parsed.data.boardNumber}${parsed.data.revision ? ` ${parsed.data.revision}` : ""}.`, make: parsed.data, kept: known.cases.get(refOf(parsed.data.reservedFor ?? "") ?? "") ?? null };
}

function planChange(line: number, cells: Record<string, string>, { row, view }: { row: ShelfBoard; view: ShelfRow }, known: Known): PlannedLine {
  const { number } = view;
  const refused = (sentence: string): PlannedLine => ({ line, result: "refused", number, sentence });
  const wanted = wantedOf(cells);
  if (!wanted) return refused(BAD_CHIPS);
  const parsed = shelfChange.shape.changes.safeParse(wanted);
  if (!parsed.success) return refused(sentenceOf(parsed.error));
  const asked = withoutBreaks(view, parsed.data);
  const found = shelfChanges(view, asked);
  const told = againstTold(cells, { state: ["", TOLD.state(view)], "taken for": ["", TOLD["taken for"](view)], "retired because": ["", TOLD["retired because"](view)] });
  if (told) return refused(told);
  if (found.length === 0) return { line, result: "same", number, sentence: "As on record." };
  if (view.state === "taken") return refused(`${number} was taken${view.taken ? ` for Drive ${view.taken.letter} of case ${view.taken.ref}` : ""}. What it is now is corrected on that drive's page.`);
  if (view.state === "retired") return refused(`${number} is retired. Bring it back to the shelf first.`);
  const reserving = found.some((one) => one.field === "reserved for") ? againstReserving(parsed.data.reservedFor ?? null, known) : null;
  if (reserving) return refused(reserving);
  return { line, result: "changed", number, sentence: `${found.map(({ field, from, to }) => `${field} from ${from ?? "nothing"} to ${to ?? "nothing"}`).join("; ")}.`, change: { row, wanted: asked, found } };
}

/** A spreadsheet writes line breaks in its own way: a text that differs in nothing else is left as it is. */
function withoutBreaks(view: ShelfRow, wanted: ShelfChange["changes"]): ShelfChange["changes"] {
  const same = (name: string, value: unknown) => {
    const now = view[name as keyof ShelfRow];
    return typeof now === "string" && now !== value && now.replace(/\r\n?/g, "\n") === value;
  };
  return Object.fromEntries(Object.entries(wanted).filter(([name, value]) => !same(name, value)));
}

function againstReserving(text: string | null, { cases }: Known): string | null {
  if (text === null) return null;
  const reading = readCaseRef(text);
  if (reading.kind === "check-character-differs") return `The check character of case number ${text} doesn't fit. Type it again.`;
  if (reading.kind !== "ref") return `Reserved for: “${text}” is no case number. A case number looks like 26-0042.`;
  const found = cases.get(reading.ref);
  if (!found) return `Reserved for: there is no case ${reading.ref}.`;
  return found.closedAt ? `Reserved for: case ${found.ref} is closed.` : null;
}

/** Columns that only tell: a file that says otherwise is out of date, or asks for what no file does. */
function againstTold(cells: Record<string, string>, allowed: Record<keyof typeof TOLD, string[]>): string | null {
  const plain = (text: string) => text.replace(/\r\n?/g, "\n").trim().toLowerCase();
  for (const [header, values] of Object.entries(allowed)) {
    const cell = cells[header] ?? "";
    if (!values.some((value) => plain(value) === plain(cell))) return `The column “${header}” says “${cell.slice(0, 80)}”, the shelf says ${values.at(-1) ? `“${values.at(-1)}”` : "nothing"}. Taking and retiring are done on the board's page; empty the cell.`;
  }
  return null;
}

const HEADER_OF = Object.fromEntries(Object.entries(FACTS).map(([header, name]) => [name, header]));

function sentenceOf(error: z.ZodError): string {
  const [issue] = error.issues;
  const [name, at, fact] = issue.path;
  const header = HEADER_OF[String(name)] ?? String(name ?? "");
  const where = name === "chips" && typeof at === "number" ? `chips, number ${at + 1}${fact === undefined ? "" : `, ${String(fact)}`}` : header;
  return issue.code === "unrecognized_keys" ? `${where}: more facts than a chip has. ${BAD_CHIPS}` : `${where ? `${where}: ` : ""}${issue.message}`;
}
