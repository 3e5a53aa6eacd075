import { readdirSync, readFileSync } from "node:fs";
import path from "node:path";
import { expect, it } from "vitest";

/**
 * Whatever is loaded by an id that came from outside goes through the loaders of lib/commands/place.ts that take the
 * actor (caseFor, driveFor, boardFor, chipFor, readFor): they hold an auditor to their case list. A bare load, by an id
 * and outside a transaction, is listed here with why it may be one.
 */
const BARE: Record<string, string> = {
  "lib/commands/place.ts": "the loaders themselves",
  "lib/commands/judge-again.ts": "Twinread's own step, for nobody",
  "lib/commands/judge-read.ts": "Twinread's own step, for nobody",
  "lib/commands/revoke-approval.ts": "an approval: chipFor follows with its chip",
  "lib/commands/record-transfer.ts": "an approval: chipFor follows with its chip",
  "lib/commands/withdraw-share.ts": "a link: allowCase follows with its case",
  "lib/commands/confirm-hand-over.ts": "a hand-over: driveFor follows with its drive",
  "lib/queries/find.ts": "only reads that the query has held against the list",
  "lib/queries/print-case.ts": "after caseView has asked",
  "lib/queries/print-write-ticket.ts": "the donor of a chip that chipFor has loaded",
  "lib/queries/read-back-view.ts": "reads of a chip's view that was made for the actor",
  "lib/queries/summary.ts": "by a customer's link, for nobody",
};
const LOAD = /\bplaceOf(?:Chip|Board|Drive)\(\s*[\w.!]+\s*\)|\b(?:Case|Drive|Board|Chip|Read|Share|Approval|HandOver)\.findByPk\(\s*[\w.!]+\s*\)/;

const root = path.resolve(import.meta.dirname, "../..");
const sources = ["lib/commands", "lib/queries", "app", "lib/http"].flatMap((folder) =>
  readdirSync(path.join(root, folder), { recursive: true, encoding: "utf8" }).filter((name) => /\.tsx?$/.test(name)).map((name) => path.posix.join(folder, name.replaceAll(path.sep, "/"))));
const read = (file: string) => readFileSync(path.join(root, file), "utf8");

it("loads nothing of a case by a bare id for whoever asks", () => {
  expect(sources.length).toBeGreaterThan(100);
  expect(sources.filter((file) => LOAD.test(read(file)) && !(file in BARE))).toEqual([]);
});

it("follows up where the thing is known before its case", () => {
  for (const [file, next] of [["revoke-approval", "chipFor(actor"], ["record-transfer", "chipFor(actor"], ["withdraw-share", "allowCase(actor"]] as const) {
    expect(read(`lib/commands/${file}.ts`), file).toContain(next);
  }
});

/** Lists of cases, drives and the like in a query that takes an actor name the list, or build on one that does. */
it("holds every query that lists things of cases against the list", () => {
  const lists = /\b(?:Case|Drive|Board|Chip|Read|CustodyHead)\.(?:findAll|findAndCountAll|count)\(|\b(?:FROM|JOIN) (?:cases|drives|boards|chips|`reads`|\\`reads\\`|custody_\w+|images)\b/;
  const held = /\b(?:inCases|casesOf|caseFor|driveFor|chipFor|readFor|chipView|caseView|driveView|allowCase|allowWorkshopAudit)\(|"(?:workshop-log\.read|user\.manage|shelf\.read)"|actor\.cases\b/;
  const without = sources.filter((file) => file.startsWith("lib/queries/")).filter((file) => {
    const text = read(file);
    return /\bactor: Actor\b/.test(text) && lists.test(text) && !held.test(text);
  });
  expect(without).toEqual([]);
});
