import { createReadStream } from "node:fs";
import { mkdir, open, stat } from "node:fs/promises";
import path from "node:path";
import { createInterface } from "node:readline";

export interface WitnessText {
  /** whole lines, without their newline */
  lines: string[];
  /** what stands after the last newline: a writer died in the middle of a line */
  rest: string;
}

/** Tells one content of an append-only file from another; null where there is no file. */
export async function witnessMark(file: string): Promise<string | null> {
  try {
    const found = await stat(file);
    return `${found.dev}:${found.ino}:${found.size}:${found.mtimeMs}`;
  } catch (error) {
    if ((error as NodeJS.ErrnoException).code === "ENOENT") return null;
    throw error;
  }
}

/** The whole file; nothing where there is none. */
export async function readWitness(file: string): Promise<WitnessText> {
  const text: WitnessText = { lines: [], rest: "" };
  if ((await witnessMark(file)) === null) return text;
  let ended = true;
  const bytes = createReadStream(file);
  bytes.on("data", (chunk) => (ended = chunk[chunk.length - 1] === 0x0a));
  for await (const line of createInterface({ input: bytes, crlfDelay: Infinity })) text.lines.push(line);
  if (!ended) text.rest = text.lines.pop() ?? "";
  return text;
}

/**
 * Adds text at the file's end, on disk before this returns. `makeFolder` is for a folder of our own: where another disk
 * should be mounted, a folder that is missing means that the disk is.
 */
export async function appendWitness(file: string, text: string, makeFolder: boolean): Promise<void> {
  const dir = path.dirname(file);
  if (makeFolder) await mkdir(dir, { recursive: true, mode: 0o700 });
  const isNew = (await witnessMark(file)) === null;
  const handle = await open(file, "a", 0o600);
  try {
    await handle.writeFile(text);
    await handle.sync();
  } finally {
    await handle.close();
  }
  if (!isNew) return;
  const folder = await open(dir, "r");
  try {
    await folder.sync();
  } finally {
    await folder.close();
  }
}
