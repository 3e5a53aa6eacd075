import { createHash } from "node:crypto";
import { type ChainFinding, checkChain } from "@/lib/core/custody";
import { keyOrder } from "@/lib/core/keyring";
import { WORKSHOP_CHAIN } from "@/lib/core/words";
import { keyring } from "@/lib/queries/keyring";
import type { Damage } from "@/scripts/check/report";
import type { LoggedSeal } from "@/scripts/check/ledger";
import { checkSeals, type SealRow } from "@/scripts/check/seals";
import { type House, verifies } from "./honest-logs";

const sha256 = (bytes: Uint8Array) => createHash("sha256").update(bytes).digest("hex");

async function* each(rows: SealRow[]): AsyncGenerator<SealRow> {
  for (const row of rows) yield await Promise.resolve(row);
}

const bodyOf = (body: Uint8Array) => JSON.parse(Buffer.from(body).toString("utf8")) as { action: string; facts: LoggedSeal };

/** What the checks of chain, keys and seals say of a house, as `npm run check:store` puts them together. */
export async function judgeHouse({ chains, seals }: House): Promise<{ keys: string[]; chains: (ChainFinding & { chain: string })[]; seals: Damage[] }> {
  const workshop = chains.get(WORKSHOP_CHAIN)!.lines.map((line, i) => ({ ...line, seq: i + 1 }));
  const ring = keyring(workshop.filter(({ body }) => bodyOf(body).action === "key.introduced").map((line) => ({ ...line, signature: Buffer.from(line.signature, "base64") })), null);
  const tools = {
    sha256, knows: (id: string) => ring.keys.has(id), order: keyOrder(ring),
    verify: (id: string, bytes: Uint8Array, signature: Uint8Array) => verifies(ring.keys.get(id) ?? "", bytes, signature),
  };
  const found: (ChainFinding & { chain: string })[] = [];
  for (const [chain, { lines, head }] of chains) found.push(...(await checkChain(lines, head, tools, chain)).map((finding) => ({ ...finding, chain })));
  const entries = new Map([...chains].map(([chain, { lines }]) => [chain, new Map(lines.map((line, i) => [i + 1, sha256(line.body)]))]));
  const sealsMade = workshop.flatMap(({ body, seq }) => (bodyOf(body).action === "seal.made" ? [{ ...bodyOf(body).facts, seq }] : []));
  const { damage } = await checkSeals(each(seals), { entries, ring, sealsMade, place: (chain) => chain });
  return { keys: ring.problems.map(({ sentence }) => sentence), chains: found, seals: damage };
}

/** What is found in an honest house beyond the heads that it says were turned back. */
export async function falseAlarms(house: House): Promise<string[]> {
  const { keys, chains, seals } = await judgeHouse(house);
  const told = chains.map(({ chain, seq, problem }) => `${chain} ${seq}: ${problem}`);
  const expected = [...house.repaired].flatMap(([chain, seqs]) => seqs.map((seq) => `${chain} ${seq}: head-was-behind`));
  return [...keys, ...told.filter((one) => !expected.includes(one)), ...expected.filter((one) => !told.includes(one)).map((one) => `${one} is not said`), ...seals.map(({ place, sentence }) => `${place}: ${sentence}`)];
}
