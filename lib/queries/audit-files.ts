import { type AuditList, END_WORD } from "@/lib/core/audit";
import type { AssessmentRow, AuditEntryRow, AuditSealRow, ChainPlace, ChainRow, SessionRow, StoredImageRow, TokenRow } from "@/lib/core/audit-rows";
import type { Actor } from "@/lib/core/words";
import { AppError } from "@/lib/errors";
import { MAX_CSV_ROWS } from "@/lib/limits";
import type { AuditInput } from "@/lib/schemas/audit";
import { auditAssessments } from "./audit-assessments";
import { auditDrives } from "./audit-drives";
import { auditEntries } from "./audit-entries";
import { auditImages } from "./audit-images";
import { type CsvColumn, csvStream } from "./csv";
import { auditSeals } from "./audit-seals";
import { auditSessions, auditTokens } from "./audit-sign-ins";

const A_BATCH = 200;

interface Page<Row> {
  items: Row[];
  total: number;
  page: number;
  pageSize: number;
}

/** One list of the audit pages: how it is asked for, and its columns in a file. Times are RFC 3339 in UTC. */
interface List<Row> {
  page(actor: Actor, input: AuditInput): Promise<Page<Row>>;
  columns: readonly CsvColumn<Row>[];
  /** the order of a file: new rows come at its end while it is read */
  sort: string;
}

const list = <Row>(page: List<Row>["page"], sort: string, columns: readonly CsvColumn<Row>[]): List<Row> => ({ page, sort, columns });

const place: CsvColumn<ChainPlace>[] = [
  { header: "case", cell: (row) => row.caseRef },
  { header: "drive", cell: (row) => (row.workshop ? "workshop" : row.letter) },
  { header: "log", cell: (row) => row.chainId },
];
const entry: CsvColumn<AuditEntryRow>[] = [
  { header: "time", cell: (row) => row.at },
  { header: "who", cell: (row) => row.who },
  { header: "role", cell: (row) => row.role },
  { header: "action", cell: (row) => row.action },
  { header: "what", cell: (row) => row.sentence },
  ...place,
  { header: "entry", cell: (row) => row.seq },
  { header: "entry sha-256", cell: (row) => row.hash },
  { header: "trouble", cell: (row) => row.trouble },
];
const entries = (name: Parameters<typeof auditEntries>[1], more: CsvColumn<AuditEntryRow>[]) => list((actor, input) => auditEntries(actor, name, input), "time", [...entry.slice(0, 5), ...more, ...entry.slice(5)]);
const reason: CsvColumn<AuditEntryRow> = { header: "reason", cell: (row) => row.reason };
const digest = (header: string): CsvColumn<AuditEntryRow> => ({ header, cell: (row) => row.digest });
const thing: CsvColumn<AuditEntryRow> = { header: "thing", cell: (row) => row.what };

const LISTS = {
  drives: list<ChainRow>(auditDrives, "case", [
    ...place, { header: "name", cell: (row) => row.label }, { header: "entries", cell: (row) => row.entries }, { header: "head sha-256", cell: (row) => row.hash }, { header: "latest entry", cell: (row) => row.lastAt },
    { header: "checked", cell: (row) => row.check?.at ?? "" }, { header: "entries checked", cell: (row) => row.check?.entries ?? "" }, { header: "findings", cell: (row) => row.check?.findings ?? "" }, { header: "first finding", cell: (row) => row.check?.first ?? "" },
  ]),
  images: list<StoredImageRow>(auditImages, "stored", [
    { header: "sha-256", cell: (row) => row.sha256 }, { header: "bytes", cell: (row) => row.sizeBytes }, { header: "state", cell: (row) => row.state }, { header: "stored", cell: (row) => row.storedAt },
    { header: "checked", cell: (row) => row.checkedAt }, { header: "erased", cell: (row) => row.erasedAt }, { header: "used by", cell: (row) => row.uses.map((use) => use.name).join("; ") }, { header: "uses", cell: (row) => row.useCount },
  ]),
  seals: list<AuditSealRow>(auditSeals, "number", [
    { header: "number", cell: (row) => row.number }, { header: "time", cell: (row) => row.at }, { header: "cause", cell: (row) => row.cause }, { header: "logs", cell: (row) => row.chains }, { header: "root", cell: (row) => row.root },
    { header: "sha-256", cell: (row) => row.sha256 }, { header: "sha-256 of the one before", cell: (row) => row.prev }, { header: "key", cell: (row) => row.keyId }, { header: "faults", cell: (row) => row.faults.join(" ") },
    { header: "mails sent", cell: (row) => row.mailed.sent }, { header: "mails not sent", cell: (row) => row.mailed.waiting + row.mailed.givenUp },
  ]),
  "hand-outs": entries("hand-outs", [thing, digest("sha-256"), { header: "to", cell: (row) => row.to }, reason]),
  refusals: entries("refusals", [{ ...thing, header: "chip" }, digest("image sha-256"), reason]),
  limits: entries("limits", [{ ...thing, header: "address" }, digest("account sha-256")]),
  clock: entries("clock", [{ header: "clock behind ms", cell: (row) => row.clockBehindMs }, { header: "head behind at entry", cell: (row) => row.headBehind }]),
  assessments: list<AssessmentRow>(auditAssessments, "time", [...entry.slice(0, 4), { header: "assessment", cell: (row) => row.reason },
    { header: "findings covered", cell: (row) => row.covered.map((f) => `${f.seq === null ? "head" : `entry ${f.seq}`}: ${f.problem}`).join("; ") }, ...entry.slice(5)]),
  sessions: list<SessionRow>(auditSessions, "from", [
    { header: "who", cell: (row) => row.who }, { header: "role", cell: (row) => row.role }, { header: "signed in", cell: (row) => row.from }, { header: "last step", cell: (row) => row.lastStep },
    { header: "ended", cell: (row) => row.ended }, { header: "how", cell: (row) => END_WORD[row.how] },
  ]),
  tokens: list<TokenRow>(auditTokens, "made", [
    { header: "token", cell: (row) => row.name }, { header: "who", cell: (row) => row.who }, { header: "role", cell: (row) => row.role }, { header: "made", cell: (row) => row.made },
    { header: "last used", cell: (row) => row.lastUsed }, { header: "withdrawn", cell: (row) => row.withdrawn },
  ]),
} as const satisfies Record<AuditList, unknown>;

export function auditPage(actor: Actor, name: AuditList, input: AuditInput): Promise<Page<unknown>> {
  return LISTS[name].page(actor, input);
}

export interface AuditFile {
  /** a name of ours */
  fileName: string;
  stream: ReadableStream<Uint8Array>;
}

/** A whole list as CSV with the filters of the page. The first rows are asked for before anything is sent, so that a refusal is one. */
export async function auditFile(actor: Actor, name: AuditList, input: AuditInput): Promise<AuditFile> {
  return fileOf(LISTS[name] as List<unknown>, actor, name, input);
}

async function fileOf<Row>({ page, columns, sort }: List<Row>, actor: Actor, name: AuditList, input: AuditInput): Promise<AuditFile> {
  const ask = (number: number) => page(actor, { ...input, sort, order: "asc", page: number, pageSize: A_BATCH });
  const first = await ask(1);
  if (first.total > MAX_CSV_ROWS) throw new AppError("does-not-fit", `The list has ${first.total.toLocaleString("en")} rows, and a file holds ${MAX_CSV_ROWS.toLocaleString("en")} at most. Narrow it by day or person, and save it in parts.`);
  async function* batches() {
    yield first.items;
    // as many pages as there were at the beginning: what is added while the file is read stays for the next one
    for (let number = 2; number <= Math.ceil(first.total / A_BATCH); number += 1) {
      const { items } = await ask(number);
      if (items.length > 0) yield items;
    }
  }
  return { fileName: `twinread-${name}.csv`, stream: csvStream(columns, first.items.length > 0 ? batches() : none<Row>()) };
}

async function* none<Row>(): AsyncGenerator<Row[]> {}
