import { mkdtempSync, rmSync } from "node:fs";
import os from "node:os";
import path from "node:path";
import { expect, it, vi } from "vitest";

// the pool of this process works as the account that migrates, so that one transaction can hold the attack and the look at it
const accounts = vi.hoisted(() => {
  const { DATABASE_URL: appUrl = "", DATABASE_ADMIN_URL: adminUrl = "" } = process.env;
  process.env.DATABASE_URL = adminUrl;
  return { appUrl, adminUrl };
});

import { randomOf } from "@/scripts/engine/random";
import { allCells, type Cell } from "@/scripts/tamper/cells";
import { isAsSaid, layersOf, runMatrix } from "@/scripts/tamper/matrix";
import { LAYERS } from "@/scripts/tamper/run";
import { emptyHouse } from "../support/empty-house";

process.env.DATABASE_URL = accounts.appUrl;
vi.setConfig({ testTimeout: 300_000 });

const ATTACKERS = ["A1", "A2", "A3", "A4", "A5", "A6", "A7"] as const;
/** one for each way of being noticed, and the two of which only an outside copy or nobody tells */
const NAMED = [
  "A1 change body first", "A1 append a forged entry, own key", "A2 delete middle", "A2 hand-over: given to another", "A2 photo: another picture", "A2 customer's link: ends later", "A3 change action last", "A3 seal: change leaves middle", "A3 approval: given by another", "A4 change an entry, chain and head made anew middle",
  "A4 the same, no copy given, the data folder's witness file left alone last", "A5 put back database and data folder, a seal mailed since", "A5 put back database and data folder, no copy from outside", "A6 one bit of an image last", "A7 the same; a bundle outside middle",
];
const nameOf = ({ attacker, name, row }: Pick<Cell, "attacker" | "name" | "row">) => `${attacker} ${name} ${row}`.trim();

/** The named ones, and two more of each attacker; the seed stands in the message. */
function sample(seed: number): Cell[] {
  const random = randomOf(seed);
  const cells = allCells();
  const picked = new Set(cells.filter((cell) => NAMED.includes(nameOf(cell))));
  for (const attacker of ATTACKERS) {
    const own = cells.filter((cell) => cell.attacker === attacker);
    for (let i = 0; i < 2; i += 1) picked.add(own[random.below(own.length)]);
  }
  return [...picked];
}

// all of them: npm run tamper:matrix
it("notices a sample of attacks by what docs/tamper-matrix.md says", async () => {
  const seed = 20_260;
  await emptyHouse();
  const folder = mkdtempSync(path.join(os.tmpdir(), "twinread-tamper-"));
  const { results } = await runMatrix(sample(seed), accounts, folder).finally(() => rmSync(folder, { recursive: true }));
  expect(NAMED.filter((name) => !results.some(({ cell }) => nameOf(cell) === name))).toEqual([]);
  expect([seed, results.filter((one) => !isAsSaid(one)).map(({ cell, outcome }) => [nameOf(cell), outcome])]).toEqual([seed, []]);
  expect(LAYERS.filter((layer) => !results.some((one) => layersOf(one).includes(layer)))).toEqual([]);
  expect(results.some((one) => layersOf(one).length === 0)).toBe(true);
});
