import { createHash } from "node:crypto";
import { type ChainLine, checkChain } from "@/lib/core/custody";
import { WORKSHOP_CHAIN } from "@/lib/core/words";
import { type House, honestHouse, verifies } from "./honest-logs";
import { judgeHouse } from "./judge-house";

/** A chain of eight entries out of an honest house, with all that its check needs. */
export interface Eight {
  house: House;
  chain: string;
  lines: ChainLine[];
  head: { seq: number; hash: string };
  pems: Map<string, string>;
}

export function eightEntries(): Eight {
  for (let seed = 100; ; seed += 1) {
    const house = honestHouse(seed);
    const found = [...house.chains].find(([chain, { lines }]) => chain !== WORKSHOP_CHAIN && lines.length >= 8 && !house.repaired.has(chain));
    if (!found) continue;
    const lines = found[1].lines.slice(0, 8);
    return { house, chain: found[0], lines, head: { seq: 8, hash: lines[7].hash! }, pems: pemsOf(house) };
  }
}

function pemsOf(house: House): Map<string, string> {
  return new Map(house.chains.get(WORKSHOP_CHAIN)!.lines.flatMap(({ body }) => {
    const { action, facts } = JSON.parse(Buffer.from(body).toString()) as { action: string; facts: { keyId: string; publicKeyPem: string } };
    return action === "key.introduced" ? [[facts.keyId, facts.publicKeyPem] as const] : [];
  }));
}

const hex = (bytes: Uint8Array) => createHash("sha256").update(bytes).digest("hex");
const flippedHex = (digits: string, at: number) => `${digits.slice(0, at)}${(parseInt(digits[at], 16) ^ (1 << at % 4)).toString(16)}${digits.slice(at + 1)}`;
function flipped(bytes: Uint8Array, at: number): Uint8Array {
  const other = Uint8Array.from(bytes);
  other[at] ^= 1 << at % 8;
  return other;
}

function toolsOf({ pems }: Eight) {
  const known = new Map<string, boolean>();
  return {
    sha256: hex, knows: (id: string) => pems.has(id),
    verify: (id: string, bytes: Uint8Array, signature: Uint8Array) => {
      const key = `${id} ${hex(bytes)} ${Buffer.from(signature).toString("latin1")}`;
      const found = known.get(key) ?? verifies(pems.get(id) ?? "", bytes, signature);
      known.set(key, found);
      return found;
    },
  };
}

/** Every change to one entry that the sweep makes; `step` takes every so many bytes of the body. */
function* changesTo(line: ChainLine, step: number): Generator<[string, Partial<ChainLine>]> {
  for (let at = step > 1 ? line.body.length % step : 0; at < line.body.length; at += step) yield [`body byte ${at}`, { body: flipped(line.body, at) }];
  const signature = Buffer.from(line.signature, "base64");
  for (let at = 0; at < 64; at += step) {
    yield [`signature byte ${at}`, { signature: Buffer.from(flipped(signature, at)).toString("base64") }];
    yield [`key id digit ${at}`, { keyId: flippedHex(line.keyId, at) }];
    yield [`hash digit ${at}`, { hash: flippedHex(line.hash!, at) }];
    yield [`prev digit ${at} beside`, { beside: { ...line.beside!, prev: flippedHex(line.beside!.prev, at) } }];
  }
  for (let bit = 0; bit < 8; bit += 1) yield [`seq bit ${bit} beside`, { beside: { ...line.beside!, seq: line.beside!.seq ^ (1 << bit) } }];
  yield ["action beside", { beside: { ...line.beside!, action: "log.other" } }];
}

export interface Sweep {
  flips: number;
  /** what was not found, or not named first */
  missed: string[];
}

/** One bit of everything in a log, one at a time: the first thing that the check names has to be that entry, or the head. */
export async function sweepLog(eight: Eight, step: number): Promise<Sweep> {
  const { lines, head, chain } = eight;
  const tools = toolsOf(eight);
  const sweep: Sweep = { flips: 0, missed: [] };
  const judge = async (name: string, changed: ChainLine[], top: typeof head | null, named: number | null) => {
    const [first] = await checkChain(changed, top, tools, chain);
    sweep.flips += 1;
    if (first === undefined || first.seq !== named) sweep.missed.push(`${name}: ${first ? `named ${first.seq}, ${first.problem}` : "not found"}`);
  };
  for (const [i, line] of lines.entries()) {
    for (const [name, change] of changesTo(line, step)) await judge(`entry ${i + 1}, ${name}`, lines.map((one, n) => (n === i ? { ...one, ...change } : one)), head, i + 1);
  }
  for (let bit = 0; bit < 8; bit += 1) await judge(`head, bit ${bit} of its number`, lines, { ...head, seq: head.seq ^ (1 << bit) }, null);
  for (let at = 0; at < 64; at += 1) await judge(`head, digit ${at}`, lines, { ...head, hash: flippedHex(head.hash, at) }, null);
  await judge("no head", lines, null, null);
  return sweep;
}

/** The same for the newest seal of the house: text, signature and list of heads, and each value beside them. */
export async function sweepSeal({ house }: Eight, step: number): Promise<Sweep> {
  const sweep: Sweep = { flips: 0, missed: [] };
  const [rest, row] = [house.seals.slice(0, -1), house.seals[house.seals.length - 1]];
  const judge = async (name: string, change: Partial<typeof row>) => {
    const [first] = (await judgeHouse({ ...house, seals: [...rest, { ...row, ...change }] })).seals;
    sweep.flips += 1;
    if (first === undefined || (change.number === undefined && first.place !== `Seal ${row.number}`)) sweep.missed.push(`${name}: ${first ? `named ${first.place}` : "not found"}`);
  };
  for (const field of ["text", "signature", "leaves"] as const) for (let at = 0; at < row[field].length; at += step) await judge(`${field} byte ${at}`, { [field]: Buffer.from(flipped(row[field], at)) });
  for (let at = 0; at < 64; at += step) {
    for (const field of ["sha256", "prev", "keyId"] as const) await judge(`${field} digit ${at}`, { [field]: flippedHex(row[field], at) });
  }
  for (const change of [{ number: row.number + 7 }, { cause: "bundle" }, { madeAt: "2020-01-01T00:00:00.000000Z" }, { chains: row.chains + 1 }]) await judge(Object.keys(change)[0], change);
  return sweep;
}
