import { Op, type WhereOptions } from "sequelize";
import { signatureLine } from "@/lib/core/bundle-layout";
import { WORKSHOP_CHAIN } from "@/lib/core/words";
import { CustodyEntry } from "@/models";

/** Entries a look: a body has at most 1 MiB, most have less than one KiB. */
const PAGE = 50;

/** Which entries of a chain go out, up to the fixed head. */
export interface LogPart {
  chain: string;
  upToSeq: number;
  /** only the entries that introduce keys */
  keysOnly?: boolean;
}

export const keysPart = (upToSeq: number): LogPart => ({ chain: WORKSHOP_CHAIN, upToSeq, keysOnly: true });

async function* entries({ chain, upToSeq, keysOnly }: LogPart): AsyncGenerator<CustodyEntry> {
  for (let after = 0; ;) {
    const where: WhereOptions = { chainId: chain, seq: { [Op.gt]: after, [Op.lte]: upToSeq }, ...(keysOnly ? { action: "key.introduced" } : {}) };
    const rows = await CustodyEntry.findAll({ where, order: ["seq"], limit: PAGE });
    yield* rows;
    if (rows.length < PAGE) return;
    after = rows[rows.length - 1].seq;
  }
}

const NEWLINE = Buffer.from("\n");

/** custody.jsonl: a line is the body, byte for byte. */
export async function* bodyLines(part: LogPart): AsyncGenerator<Buffer> {
  for await (const entry of entries(part)) yield Buffer.concat([entry.body, NEWLINE]);
}

/** custody.sig: one line an entry, in the same order. */
export async function* signatureLines(part: LogPart): AsyncGenerator<Buffer> {
  for await (const entry of entries(part)) yield Buffer.from(signatureLine(entry.keyId, entry.signature.toString("base64")));
}
