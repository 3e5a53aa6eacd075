import { createHash } from "node:crypto";
import { QueryTypes } from "sequelize";
import type { AuditSealRow, SealState } from "@/lib/core/audit-rows";
import { ZERO_HASH } from "@/lib/core/custody";
import { parseSeal } from "@/lib/core/seal";
import type { Actor } from "@/lib/core/words";
import { env } from "@/lib/env";
import { sealMailSubject } from "@/lib/mail/seal-text";
import type { AuditInput } from "@/lib/schemas/audit";
import { connection, Mail, Seal } from "@/models";
import { verifySignature } from "@/storage";
import { allowAudit } from "./audit-rights";
import { sealKeys } from "./seals";
import { dayIn } from "./workshop-day";

const sha256 = (bytes: Uint8Array) => createHash("sha256").update(bytes).digest("hex");

/** What is wrong with one seal as it is stored, and with its link to the one before it; bodies are hostile input. */
function faultsOf(row: Seal, before: Seal | undefined, keys: Map<string, string>): string[] {
  const faults: string[] = [];
  const facts = parseSeal(row.text.toString("utf8"));
  const prev = row.prev.toString("hex");
  if (!facts) faults.push("Its text is not a seal.");
  else if (facts.number !== row.number || facts.chains !== row.chains || facts.prev !== prev) faults.push("The row beside it says something else than its text.");
  if (row.sha256.toString("hex") !== sha256(row.text)) faults.push("The stored SHA-256 is not the one of its text.");
  if (row.number === 1 ? prev !== ZERO_HASH : before && prev !== sha256(before.text)) faults.push(row.number === 1 ? "The first seal names one before it." : `It does not carry the SHA-256 of seal ${row.number - 1}.`);
  if (row.number > 1 && !before) faults.push(`Seal ${row.number - 1} is missing before it.`);
  const key = keys.get(row.keyId);
  if (!key) faults.push("It is signed with a key that the log never introduced.");
  else if (!verifySignature(key, row.text, row.signature)) faults.push("Its signature does not fit its text.");
  return faults;
}

async function rowsOf(rows: Seal[]): Promise<AuditSealRow[]> {
  const keys = await sealKeys();
  const near = new Map((await Seal.findAll({ attributes: { exclude: ["leaves"] }, where: { number: rows.map((row) => row.number - 1) } })).map((row) => [row.number, row]));
  const subjects = rows.map((row) => sealMailSubject(row.number, env().workshop));
  const mails = await Mail.findAll({ attributes: ["subject", "state"], where: { subject: subjects } });
  return rows.map((row, i): AuditSealRow => {
    const facts = parseSeal(row.text.toString("utf8"));
    const states = mails.filter((mail) => mail.subject === subjects[i]).map((mail) => mail.state);
    const sent = states.filter((state) => state === "sent").length;
    const givenUp = states.filter((state) => state === "dead").length;
    return {
      number: row.number, at: facts?.at ?? row.madeAt.toISOString(), cause: row.cause, chains: row.chains, root: facts?.root ?? "", prev: row.prev.toString("hex"), sha256: sha256(row.text),
      keyId: row.keyId, faults: faultsOf(row, near.get(row.number - 1), keys), mailed: { sent, givenUp, waiting: states.length - sent - givenUp },
    };
  });
}

/** The chain of seals, each held against its text, its key and the seal before it. A seal tells of no case. */
export async function auditSeals(actor: Actor, input: AuditInput): Promise<{ items: AuditSealRow[]; total: number; page: number; pageSize: number }> {
  allowAudit(actor);
  const where = input.what ? { cause: input.what } : {};
  const { rows, count } = await Seal.findAndCountAll({
    attributes: { exclude: ["leaves"] }, where, order: [["number", input.order === "asc" ? "ASC" : "DESC"]], limit: input.pageSize, offset: (input.page - 1) * input.pageSize,
  });
  return { items: await rowsOf(rows), total: count, page: input.page, pageSize: input.pageSize };
}

/** Where the chain of seals stands. Links and digests of all are compared by the database, the newest seal's signature here. */
export async function sealState(actor: Actor): Promise<SealState> {
  allowAudit(actor);
  const total = await Seal.count();
  const newest = await Seal.findOne({ attributes: { exclude: ["leaves"] }, order: [["number", "DESC"]] });
  const faulty = await connection().query<{ number: number }>(
    `SELECT s.number FROM seals s LEFT JOIN seals p ON p.number = s.number - 1
     WHERE UNHEX(SHA2(s.text, 256)) <> s.sha256 OR (s.number = 1 AND s.prev <> UNHEX(:zero)) OR (s.number > 1 AND (p.number IS NULL OR UNHEX(SHA2(p.text, 256)) <> s.prev))
     ORDER BY s.number LIMIT 10`,
    { replacements: { zero: ZERO_HASH }, type: QueryTypes.SELECT },
  );
  const [row] = newest ? await rowsOf([newest]) : [];
  const numbers = new Set([...faulty.map((one) => one.number), ...(row && row.faults.length > 0 ? [row.number] : [])]);
  const zone = env().timeZone;
  return { total, newest: row ?? null, today: row !== undefined && dayIn(zone, new Date(row.at)) === dayIn(zone, new Date()), faulty: [...numbers] };
}
