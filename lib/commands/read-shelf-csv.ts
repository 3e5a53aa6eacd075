import { CsvError, parse } from "csv-parse/sync";
import { MAX_SHELF_FILE_BYTES, MAX_SHELF_FILE_ROWS } from "@/lib/core/shelf";
import { AppError } from "@/lib/errors";
import { HEADERS, unguard } from "@/lib/queries/shelf-file";

export interface CsvRow {
  /** where it begins in the file, from 1 */
  line: number;
  /** by the name of the column; null where the row has another number of cells than the header */
  cells: Record<string, string> | null;
  /** how many cells it has */
  count: number;
}

const MOST_CELLS = 200;
const refuse = (detail: string) => new AppError("does-not-fit", detail);

/** Reads a file of the shelf: UTF-8 with or without a byte order mark; commas, semicolons or tabs; header first. Hostile input. */
export function readShelfCsv(bytes: Uint8Array): CsvRow[] {
  if (bytes.length > MAX_SHELF_FILE_BYTES) throw new AppError("too-large", "The file is larger than 10 MiB. Split it, with the header row in each part.");
  const text = textOf(bytes);
  if (text.trim() === "") throw refuse("The file is empty. Its first line has to name the columns; saving the shelf as CSV shows how.");
  let columns: string[] | null = null;
  const rows: CsvRow[] = [];
  try {
    parse(text, {
      delimiter: delimiterOf(text), relax_column_count: true, skip_empty_lines: true, max_record_size: 65_536,
      on_record: (record: string[], { lines }: { lines: number }) => {
        const breaks = record.reduce((sum, cell) => sum + (cell.match(/\n/g)?.length ?? 0), 0);
        const line = lines - breaks;
        // ends here, not after millions of cells
        if (record.length > MOST_CELLS) throw refuse(`Line ${line.toLocaleString("en")} has ${record.length.toLocaleString("en")} cells; the shelf has ${HEADERS.length} columns. Look for what parts the cells in this file.`);
        if (!columns) columns = headerOf(record);
        else if (record.some((cell) => cell.trim() !== "")) rows.push(rowOf(record, columns, line));
        if (rows.length > MAX_SHELF_FILE_ROWS) throw refuse(`The file has more than ${MAX_SHELF_FILE_ROWS.toLocaleString("en")} rows. Split it, with the header row in each part.`);
        return null;
      },
    });
  } catch (error) {
    if (error instanceof AppError) throw error;
    if (error instanceof CsvError) throw refuse(sentenceOf(error));
    throw error;
  }
  if (rows.length === 0) throw refuse("The file has a header row and nothing below it. Add a row for each board.");
  return rows;
}

function textOf(bytes: Uint8Array): string {
  if ((bytes[0] === 0xff && bytes[1] === 0xfe) || (bytes[0] === 0xfe && bytes[1] === 0xff)) throw refuse("The file is UTF-16 text. Save it as CSV in UTF-8 and send it again.");
  try {
    // a byte order mark is left out by the decoder
    const text = new TextDecoder("utf-8", { fatal: true }).decode(bytes);
    // one kind of line end, so that lines are counted as a person counts them
    return text.replace(/\r\n?/g, "\n");
  } catch {
    throw refuse("The file is not UTF-8 text. Save it as CSV in UTF-8 and send it again.");
  }
}

/** What parts the cells of the header row: comma, semicolon or tab, whichever stands there most often outside quotes. */
function delimiterOf(text: string): string {
  const counts = new Map([[",", 0], [";", 0], ["\t", 0]]);
  let quoted = false;
  for (const character of text.trimStart().slice(0, 4096)) {
    if (character === '"') quoted = !quoted;
    else if (!quoted && character === "\n") break;
    else if (!quoted && counts.has(character)) counts.set(character, counts.get(character)! + 1);
  }
  return [...counts].sort((a, b) => b[1] - a[1])[0][0];
}

function headerOf(record: readonly string[]): string[] {
  const names = record.map((cell) => unguard(cell).trim().toLowerCase().replace(/\s+/g, " "));
  const known = `Known are: ${HEADERS.join(", ")}.`;
  const strange = names.find((name) => !HEADERS.includes(name));
  if (strange !== undefined) throw refuse(`The first line has to name the columns, and “${strange.slice(0, 60)}” is none. ${known}`);
  const twice = names.find((name, i) => names.indexOf(name) !== i);
  if (twice) throw refuse(`The column “${twice}” stands there twice. Leave one out.`);
  if (!names.includes("board number")) throw refuse(`The column “board number” is missing. ${known}`);
  return names;
}

function rowOf(record: readonly string[], columns: readonly string[], line: number): CsvRow {
  if (record.length !== columns.length) return { line, cells: null, count: record.length };
  return { line, cells: Object.fromEntries(columns.map((name, i) => [name, unguard(record[i]).trim()])), count: record.length };
}

function sentenceOf(error: CsvError): string {
  const lines: unknown = (error as unknown as { lines?: unknown }).lines;
  const where = typeof lines === "number" ? `Line ${lines.toLocaleString("en")}` : "A line";
  if (error.code === "CSV_QUOTE_NOT_CLOSED") return "A quote is opened and never closed. Look for a single \" in the file, and write it twice.";
  if (error.code === "CSV_MAX_RECORD_SIZE") return `${where} is longer than 64 KiB. Look for a quote that is not closed.`;
  if (error.code === "INVALID_OPENING_QUOTE" || error.code === "CSV_INVALID_CLOSING_QUOTE") return `${where}: a quote stands in the middle of a cell. Put the cell in quotes and write a quote within it twice.`;
  return `${where} is not well-formed CSV. Save the file once more as CSV.`;
}
