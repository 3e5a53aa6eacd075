import { readdirSync } from "node:fs";
import path from "node:path";
import { expect } from "@playwright/test";
import { dataFolder } from "./accounts";
import { chipOf, custodyOf, type Pair } from "./bench";

const namesIn = (folder: string) => readdirSync(path.join(dataFolder(), folder), { recursive: true, encoding: "utf8" });

/** The digests of all stored images. */
export const storedImages = (): string[] => namesIn("images/sha256").map((name) => path.basename(name)).filter((name) => name.length === 64).sort();
/** What uploads left lying on their way. */
export const incoming = (): string[] => namesIn("images/incoming");

/** Everything that an upload could have changed. */
async function traces(token: string, { chipId, driveId }: Pair): Promise<object> {
  const { reads, state } = await chipOf(token, chipId);
  return { reads: reads.map((read) => read.id), state, entries: (await custodyOf(token, driveId)).length, images: storedImages() };
}

/** Runs what must be refused, and holds the store, the log and the chip against what they were before. */
export async function expectNothingStored(token: string, pair: Pair, run: () => Promise<unknown>): Promise<void> {
  const before = await traces(token, pair);
  await run();
  await expect.poll(incoming, "what an upload left behind").toEqual([]);
  expect(await traces(token, pair)).toEqual(before);
}
