import { LOG_KEY, TAG_MANIFEST, TAG_SIGNATURE, WORKSHOP_KEYS } from "../bundle-layout";
import { checkChain } from "../custody";
import { keyring, type Keyring } from "../keyring";
import { WORKSHOP_CHAIN } from "../words";
import { type Files } from "./lists";
import { readLog } from "./log-lines";
import { textOf } from "./read-files";
import { type Step, StepNotes } from "./report";
import { keyTools, sha256Hex, type VerifyTools } from "./tools";
import { countOf } from "../quantity";

/** The key in the bundle that its log and its tag manifest are signed with; null where it is no key. */
export function logKeyOf(files: Files, tools: VerifyTools): { pem: string; id: string } | null {
  const pem = textOf(files, LOG_KEY);
  const id = pem === null ? null : keyTools(tools).keyId(pem);
  return pem === null || id === null ? null : { pem, id };
}

export function checkTagSignature(files: Files, tools: VerifyTools): Step {
  const notes = new StepNotes("tag-signature", "The signature over the lists");
  const key = logKeyOf(files, tools);
  const [list, signature] = [files.get(TAG_MANIFEST)?.bytes, files.get(TAG_SIGNATURE)?.bytes];
  if (!key) notes.fault(LOG_KEY, files.has(LOG_KEY) ? "It is not an Ed25519 public key in PEM." : "It is missing.");
  if (!signature) notes.fault(TAG_SIGNATURE, "It is missing.");
  if (key && list && signature && !keyTools(tools).verify(key.pem, list, signature)) {
    notes.fault(TAG_SIGNATURE, `It does not fit ${TAG_MANIFEST} and the key in the bundle: one of the three was changed, or somebody else made these lists.`);
  }
  if (!list) return notes.notChecked(`There is no ${TAG_MANIFEST} that could be signed.`);
  return notes.done(`The log key signed ${TAG_MANIFEST}, and with it every file.`);
}

const NO_KEYS: Keyring = { keys: new Map(), sealKeys: new Map(), problems: [] };

/** Who may sign: the first key introduces itself, each later one was signed for by the log key in use before it. */
export async function checkKeys(files: Files, tools: VerifyTools): Promise<{ step: Step; ring: Keyring }> {
  const notes = new StepNotes("keys", "Where the keys come from");
  const lines = readLog(files, WORKSHOP_KEYS, notes);
  if (lines.length === 0) return { step: notes.notChecked("There is no entry that introduces a key."), ring: NO_KEYS };
  const place = (n: number) => `${WORKSHOP_KEYS}.jsonl, line ${n}`;
  let before = 0;
  for (const [i, line] of lines.entries()) {
    // a part of a longer chain: numbers go up, and what lies between is not here
    const found = await checkChain([line], null, { sha256: (bytes) => sha256Hex(bytes, tools), verify: () => true }, WORKSHOP_CHAIN);
    for (const { problem, expected, found: is } of found) {
      if (problem === "not-readable" || problem === "not-canonical" || problem === "wrong-shape" || problem === "other-chain") notes.fault(place(i + 1), "It is not an entry of the workshop's log in its canonical form.", expected, is);
    }
    const { seq, action } = headOf(line.body);
    if (action !== "key.introduced") notes.fault(place(i + 1), "It does not introduce a key.", "key.introduced", action);
    if (seq <= before) notes.fault(place(i + 1), "Its number is not above the one before.", `${before + 1} or more`, String(seq));
    before = seq;
  }
  const ring = keyring(lines.map((line, i) => ({ seq: i + 1, body: line.body, signature: line.bytes, keyId: line.keyId })), keyTools(tools), null);
  for (const { seq, sentence } of ring.problems) notes.fault(place(seq), sentence);
  const key = logKeyOf(files, tools);
  const newest = [...ring.keys.keys()].at(-1);
  if (key && !ring.keys.has(key.id)) notes.fault(LOG_KEY, "It is not among the keys that the workshop's log introduces.", newest, key.id);
  else if (key && key.id !== newest) notes.fault(LOG_KEY, "It is a log key that was replaced before this bundle was made.", newest, key.id);
  const seals = ring.sealKeys.size > 0 ? ` and ${countOf(ring.sealKeys.size, "key")} for seals` : "";
  return { step: notes.done(`${countOf(ring.keys.size, "log key")}${seals}, each introduced by a signed entry of the workshop's log.`), ring };
}

/** Hostile input: number and action of an entry, as far as it has them. */
function headOf(body: Uint8Array): { seq: number; action: string } {
  try {
    const { seq, action } = JSON.parse(new TextDecoder().decode(body)) as { seq?: unknown; action?: unknown };
    return { seq: typeof seq === "number" ? seq : 0, action: typeof action === "string" ? action : "none" };
  } catch {
    return { seq: 0, action: "none" };
  }
}
