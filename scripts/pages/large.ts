import type { Page } from "@playwright/test";
import { MAX_IMAGE_BYTES } from "@/lib/limits";

// A case with the largest chips that are taken, recorded through the interface by whoever is signed in on the page.
const CUSTOMER = "Measured by the page bench";

export interface Large {
  /** three reads of 64 MiB that differ in thousands of places */
  three: string;
  /** two reads of 64 MiB that have nothing in common */
  other: string;
  /** thirty reads of 512 KiB */
  thirty: string;
}

interface Image {
  chipId: string;
  seating: number;
  sizeBytes: number;
  seed: number;
  /** how many bytes are another's, and which */
  changes: number;
  changeSeed: number;
}

async function post<T>(page: Page, address: string, body: unknown): Promise<T> {
  const answer = await page.evaluate(async ([to, what]) => {
    const said = await fetch(to, { method: "POST", headers: { "content-type": "application/json", "idempotency-key": crypto.randomUUID() }, body: what });
    return { ok: said.ok, text: await said.text() };
  }, [address, JSON.stringify(body)] as const);
  if (!answer.ok) throw new Error(`${address}: ${answer.text}`);
  return JSON.parse(answer.text) as T;
}

/** Made in the page and sent from it: xorshift32 from a seed, so that each run has the same images. */
async function upload(page: Page, image: Image): Promise<void> {
  const problem = await page.evaluate(async ({ chipId, seating, sizeBytes, seed, changes, changeSeed }) => {
    const words = new Uint32Array(sizeBytes / 4);
    let x = seed;
    for (let i = 0; i < words.length; i += 1) {
      x ^= x << 13;
      x ^= x >>> 17;
      x ^= x << 5;
      words[i] = x;
    }
    const bytes = new Uint8Array(words.buffer);
    let y = changeSeed;
    for (let i = 0; i < changes; i += 1) {
      y ^= y << 13;
      y ^= y >>> 17;
      y ^= y << 5;
      bytes[(y >>> 0) % sizeBytes] ^= 1 + (i % 255);
    }
    const form = new FormData();
    for (const [name, value] of [["stage", "before"], ["seating", String(seating)], ["reader", "R1"], ["supplyMillivolts", "1800"]]) form.append(name, value);
    form.append("file", new Blob([bytes]), `seating-${seating}-${changeSeed}.bin`);
    const answer = await fetch(`/api/chips/${chipId}/reads`, { method: "POST", headers: { "idempotency-key": crypto.randomUUID() }, body: form });
    return answer.ok ? null : await answer.text();
  }, image);
  if (problem) throw new Error(problem);
}

/** The chips to measure; made at the first call on a data folder, which keeps them. */
export async function largeChips(page: Page): Promise<Large> {
  const found = await page.evaluate(async (customer) => {
    const list = await (await fetch(`/api/cases?q=${encodeURIComponent(customer)}`)).json() as { items: { id: string }[] };
    return list.items[0] ? await (await fetch(`/api/cases/${list.items[0].id}`)).json() as { drives: { boards: { chips: { id: string; designator: string }[] }[] }[] } : null;
  }, CUSTOMER);
  const kept = found?.drives[0]?.boards[0]?.chips ?? [];
  const idOf = (designator: string) => kept.find((chip) => chip.designator === designator)?.id;
  const [three, other, thirty] = [idOf("U1"), idOf("U2"), idOf("U3")];
  if (three && other && thirty) return { three, other, thirty };

  const made = await post<{ id: string }>(page, "/api/cases", { customer: { name: CUSTOMER, email: "bench@alderlane.example" }, damage: "None: recorded to measure pages." });
  const drive = await post<{ id: string }>(page, `/api/cases/${made.id}/drives`, { partNumber: "PN 6400-0064-A" });
  const board = await post<{ id: string }>(page, `/api/drives/${drive.id}/boards`, { role: "original", boardNumber: "BX 64-0001" });
  const chip = async (designator: string, sizeBytes: number) => (await post<{ id: string }>(page, `/api/boards/${board.id}/chips`, { designator, bus: "spi", sizeBytes, supplyMillivolts: 1800 })).id;
  const large = { three: await chip("U1", MAX_IMAGE_BYTES), other: await chip("U2", MAX_IMAGE_BYTES), thirty: await chip("U3", 512 * 1024) };
  for (const n of [1, 2, 3]) await upload(page, { chipId: large.three, seating: n, sizeBytes: MAX_IMAGE_BYTES, seed: 64, changes: n === 1 ? 0 : 2_000, changeSeed: 100 + n });
  for (const n of [1, 2]) await upload(page, { chipId: large.other, seating: n, sizeBytes: MAX_IMAGE_BYTES, seed: 640 + n, changes: 0, changeSeed: n });
  for (let n = 1; n <= 30; n += 1) await upload(page, { chipId: large.thirty, seating: Math.ceil(n / 3), sizeBytes: 512 * 1024, seed: 30, changes: n % 4 === 0 ? 200 : 0, changeSeed: 300 + n });
  return large;
}
