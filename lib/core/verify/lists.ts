import { bagitTxt, MANIFEST, TAG_MANIFEST, TAG_SIGNATURE } from "../bundle-layout";
import { countOf, withCommas } from "../quantity";
import { pathFault } from "./bag";
import { type ReadFile, textOf } from "./read-files";
import { type Step, StepNotes } from "./report";

/** The BagIt part of the check, RFC 8493: what has to be there, and that each listed digest is the file's. */
export type Files = ReadonlyMap<string, ReadFile>;

const inPayload = (path: string) => path.startsWith("data/");
const isList = (path: string) => /^(tag)?manifest-[^/]*$/.test(path);
const LISTED_TAGS = ["bagit.txt", "bag-info.txt", MANIFEST, "README.txt", "check.sh"];

export function checkDeclaration(files: Files): Step {
  const notes = new StepNotes("bagit", "The bag's declaration");
  const text = textOf(files, "bagit.txt");
  if (!files.has("bagit.txt")) notes.fault("bagit.txt", "It is missing.");
  else if (text !== bagitTxt()) {
    const why = text?.startsWith("\ufeff") ? "It begins with a byte order mark." : "It is not the two lines of a BagIt 1.0 bag.";
    notes.fault("bagit.txt", why, bagitTxt().trimEnd().replace("\n", ", "), text?.trimEnd().replaceAll("\n", ", ") ?? "no text");
  }
  for (const path of files.keys()) {
    if (path !== MANIFEST && path !== TAG_MANIFEST && path !== TAG_SIGNATURE && isList(path)) {
      notes.fault(path, "It is a list of a kind that a bundle doesn't have: two lists could say two things.");
    }
  }
  return notes.done("The folder says of itself that it is a BagIt 1.0 bag (RFC 8493) in UTF-8.");
}

/** Labels that may stand once only (RFC 8493, section 2.2.2). */
const ONCE = ["Bagging-Date", "External-Identifier", "Payload-Oxum"];

export function checkCount(files: Files): Step {
  const notes = new StepNotes("oxum", "Number and size of the files");
  const text = textOf(files, "bag-info.txt");
  if (text === null) {
    notes.fault("bag-info.txt", files.has("bag-info.txt") ? "It is not text in UTF-8." : "It is missing.");
    return notes.done("");
  }
  const lines = text.split("\n").filter((line) => line !== "").map((line) => /^([^:\s][^:]*): (.*)$/.exec(line));
  if (!text.endsWith("\n") || lines.includes(null)) notes.fault("bag-info.txt", "It has a line that is not a label, a colon and a value.");
  for (const label of ONCE) {
    const times = lines.filter((line) => line?.[1].toLowerCase() === label.toLowerCase()).length;
    if (times !== 1) notes.fault("bag-info.txt", times === 0 ? `It does not give ${label}.` : `It gives ${label} ${times} times.`);
  }
  const payload = [...files].filter(([path]) => inPayload(path));
  const octets = payload.reduce((sum, [, file]) => sum + file.sizeBytes, 0);
  const is = `${octets}.${payload.length}`;
  const said = lines.find((line) => line?.[1] === "Payload-Oxum")?.[2];
  if (said !== undefined && said !== is) notes.fault("bag-info.txt", "The case's files are not as many, or not as large, as it says.", said, is);
  return notes.done(`${countOf(payload.length, "file")} of the case with ${withCommas(octets)} bytes, as bag-info.txt says.`);
}

export interface Listed {
  path: string;
  sha256: string;
}

function linesOf(files: Files, list: string, notes: StepNotes): Listed[] | null {
  const text = textOf(files, list);
  if (text === null) {
    notes.fault(list, files.has(list) ? "It is not text in UTF-8." : "It is missing.");
    return null;
  }
  if (!text.endsWith("\n")) notes.fault(list, "It does not end with a whole line.");
  const listed: Listed[] = [];
  const seen = new Set<string>();
  text.replace(/\n$/, "").split("\n").forEach((line, i) => {
    const found = /^([0-9a-f]{64}) {2}(.+)$/.exec(line);
    const wrong = found ? pathFault(found[2]) : "It is not a digest, two spaces and a path.";
    if (!found || wrong !== null) return notes.fault(`${list}, line ${i + 1}`, wrong ?? "", undefined, line);
    const [, sha256, path] = found;
    if (seen.has(path)) return notes.fault(`${list}, line ${i + 1}`, `It lists ${path} a second time.`);
    seen.add(path);
    listed.push({ path, sha256 });
  });
  return listed;
}

function compare(files: Files, list: string, listed: Listed[], notes: StepNotes): void {
  for (const { path, sha256 } of listed) {
    const file = files.get(path);
    if (!file) notes.fault(path, `${list} names it, and it is missing.`);
    else if (file.sha256 !== sha256) notes.fault(path, `Its SHA-256 is not the one in ${list}: it was changed, or the list was.`, sha256, file.sha256);
  }
}

export function checkManifest(files: Files): Step {
  const notes = new StepNotes("manifest", "The case's files");
  const listed = linesOf(files, MANIFEST, notes);
  if (!listed) return notes.done("");
  compare(files, MANIFEST, listed, notes);
  for (const { path } of listed) if (!inPayload(path)) notes.fault(MANIFEST, `It names ${path}, which is no file of the case.`);
  const names = new Set(listed.map(({ path }) => path));
  for (const path of files.keys()) if (inPayload(path) && !names.has(path)) notes.fault(path, `It is there, and ${MANIFEST} does not name it.`);
  return notes.done(`${countOf(listed.length, "file")}, each listed once and each with the SHA-256 of ${MANIFEST}.`);
}

export function checkTagManifest(files: Files): Step {
  const notes = new StepNotes("tag-manifest", "The lists and the pages about the bundle");
  const listed = linesOf(files, TAG_MANIFEST, notes);
  if (!listed) return notes.done("");
  compare(files, TAG_MANIFEST, listed, notes);
  const names = new Set(listed.map(({ path }) => path));
  for (const path of names) {
    if (inPayload(path)) notes.fault(TAG_MANIFEST, `It names ${path}, a file of the case: those stand in ${MANIFEST} alone.`);
    if (path === TAG_MANIFEST || path === TAG_SIGNATURE) notes.fault(TAG_MANIFEST, `It names ${path}, which can't be in its own list.`);
  }
  for (const path of LISTED_TAGS) if (!names.has(path)) notes.fault(TAG_MANIFEST, `It does not name ${path}.`);
  for (const path of files.keys()) {
    if (!inPayload(path) && path !== TAG_MANIFEST && path !== TAG_SIGNATURE && !names.has(path)) notes.fault(path, `It is there, and ${TAG_MANIFEST} does not name it.`);
  }
  return notes.done(`${countOf(listed.length, "file")}, each listed once and each with the SHA-256 of ${TAG_MANIFEST}.`);
}
