import { stringify } from "csv-stringify/sync";

/**
 * The one place where Twinread writes CSV (RFC 4180: CRLF, quotes doubled, header first, UTF-8). A cell that a spreadsheet
 * would take for a formula gets a leading apostrophe: = + - @ tab and CR by the library (also their full-width forms),
 * line feed and NUL here (OWASP ASVS 1.2.10).
 */
export type CsvCell = string | number | boolean | null;
export interface CsvColumn<Row> {
  header: string;
  cell(row: Row): CsvCell;
}

const STARTS_ALIKE = /^[\0\n]/;

/** A number stays one: the library leaves its minus alone. */
function written(cell: CsvCell): string | number {
  if (typeof cell === "number") return cell;
  if (typeof cell !== "string") return cell === null ? "" : cell ? "yes" : "no";
  return STARTS_ALIKE.test(cell) ? `'${cell}` : cell;
}

// without quote_record_delimiter a lone CR or LF stands unquoted once the line ends in CRLF
const lines = (records: (string | number)[][]) => stringify(records, { record_delimiter: "\r\n", quote_record_delimiter: true, escape_formulas: true });

export function csvHeader<Row>(columns: readonly CsvColumn<Row>[]): string {
  return lines([columns.map((column) => column.header)]);
}

export function csvLines<Row>(columns: readonly CsvColumn<Row>[], rows: readonly Row[]): string {
  return rows.length === 0 ? "" : lines(rows.map((row) => columns.map((column) => written(column.cell(row)))));
}

/** A file that is written while it is read: the header, then one batch after the other, none of them empty. */
export function csvStream<Row>(columns: readonly CsvColumn<Row>[], batches: AsyncIterable<readonly Row[]>): ReadableStream<Uint8Array> {
  const encoder = new TextEncoder();
  const source = batches[Symbol.asyncIterator]();
  return new ReadableStream<Uint8Array>({
    start: (controller) => controller.enqueue(encoder.encode(csvHeader(columns))),
    async pull(controller) {
      const next = await source.next();
      if (next.done) controller.close();
      else controller.enqueue(encoder.encode(csvLines(columns, next.value)));
    },
    cancel: async () => void (await source.return?.()),
  });
}

export const CSV_TYPE = "text/csv; charset=utf-8; header=present";
