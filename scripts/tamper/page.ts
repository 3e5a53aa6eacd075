import { withCommas } from "@/lib/core/quantity";
import type { Attacker } from "./cells";
import type { BundleAgreement } from "./bundles";
import { layersOf, type Result } from "./matrix";
import { LAYERS, type Layer } from "./run";

const WHO: Record<Attacker, string> = {
  A1: "has the app's account in the database", A2: "has the account that migrates, and takes triggers away", A3: "is root of the database server, and takes triggers away",
  A4: "is that root and makes chain and head fit again, but has no key", A5: "is that root and puts last week's dump back", A6: "can write to the folder of stored images", A7: "is that root and has both signing keys",
};
const BY: Record<Layer, string> = {
  refused: "the database refuses it", chain: "the chain", signature: "a signature", seal: "a seal inside", record: "the row against the log", image: "the image against its digest", start: "the app does not start",
  witness: "only the witness file", outside: "only a copy from outside",
};

/** The first layer that says something; what only an outside copy tells counts as that. */
export const headline = (result: Result): Layer | "nobody" => layersOf(result)[0] ?? "nobody";

function countTable(results: readonly Result[]): string[] {
  const kinds = [...LAYERS, "nobody" as const];
  return [
    `| attacker | cells | ${kinds.map((kind) => (kind === "nobody" ? "nobody sees it" : BY[kind])).join(" | ")} |`, `|---|---|${kinds.map(() => "---|").join("")}`,
    ...(Object.keys(WHO) as Attacker[]).map((attacker) => {
      const own = results.filter((one) => one.cell.attacker === attacker);
      return `| ${attacker} ${WHO[attacker]} | ${own.length} | ${kinds.map((kind) => own.filter((one) => headline(one) === kind).length || "").join(" | ")} |`;
    }),
  ];
}

const said = (result: Result) => {
  const layers = layersOf(result);
  if (layers.length === 0) return "**nobody**";
  return layers[0] === "refused" && layers.length > 1 ? `refused; without the protection: ${layers.slice(1).join(", ")}` : layers.join(", ");
};

/** One line an operation and place; the attackers side by side. */
function cellTable(results: readonly Result[]): string[] {
  const strong = results.filter(({ cell }) => !["A1", "A2", "A3"].includes(cell.attacker));
  const plain = results.filter(({ cell }) => ["A1", "A2", "A3"].includes(cell.attacker));
  const keys = [...new Set(plain.map(({ cell }) => `${cell.name} · ${cell.row}`))];
  const of = (key: string, attacker: Attacker) => plain.find(({ cell }) => cell.attacker === attacker && `${cell.name} · ${cell.row}` === key);
  return [
    "| operation | row | A1 | A2 | A3 |", "|---|---|---|---|---|",
    ...keys.map((key) => {
      const [name, row] = key.split(" · ");
      return `| ${name} | ${row} | ${(["A1", "A2", "A3"] as const).map((attacker) => {
        const found = of(key, attacker);
        return found ? said(found) : "";
      }).join(" | ")} |`;
    }),
    "", "| attacker | operation | row | noticed by | first thing named |", "|---|---|---|---|---|",
    ...strong.map((one) => `| ${one.cell.attacker} | ${one.cell.name} | ${one.cell.row} | ${said(one)} | ${(one.outcome?.first ?? "").split("; ")[0].replace(/Case \d\d-\d{4}/, "Case")} |`),
  ];
}

export interface Mutation {
  name: string;
  file: string;
  noticed: boolean;
}

function unseenList(results: readonly Result[]): string[] {
  const why = new Map<string, string[]>();
  for (const { cell } of results.filter((one) => layersOf(one).length === 0)) {
    const reason = cell.unseen ?? "";
    why.set(reason, [...new Set([...(why.get(reason) ?? []), `${cell.attacker} ${cell.name}${cell.row ? ` (${cell.row})` : ""}`])]);
  }
  return [...why].map(([reason, cells]) => `- ${reason}\n${cells.map((cell) => `  - ${cell}`).join("\n")}`);
}

export function matrixPage({ results, agreements, mutants, honest }: { results: readonly Result[]; agreements: readonly BundleAgreement[]; mutants: string; honest: string }): string {
  const times = results.flatMap(({ outcome }) => (outcome && outcome.ms > 0 ? [outcome.ms] : [])).sort((a, b) => a - b);
  const made = agreements.filter((one) => one.page !== "not made");
  const unseen = results.filter((one) => layersOf(one).length === 0).length;
  return `# What tampering is noticed, and by what

Made by \`npm run tamper:matrix\`: each attack is carried out on a real MariaDB and a real data folder, in a transaction that is taken back, and the whole of \`npm run check:store\` looks at it before. First, middle and last row: the last entry of the drive lies after the newest seal and after every copy that left the house. **${withCommas(results.length)} cells: ${results.length - unseen} refused or noticed, ${unseen} seen by nobody**, each of those with its reason below. A look at the whole store took ${Math.round(times[Math.floor(times.length / 2)] ?? 0)} ms in the middle.

A2 and A3 are tried twice: with the triggers and versions in place, which stops most, and after taking them away, which both can. Both answers stand in their cells.

## Counts

Each cell is counted once, by the first of these that stops or shows it.

${countTable(results).join("\n")}

## The window

Whoever is root of the database server can make an earlier state of it look sound: cut the log's tail and the seals with it, or put a dump back. Whoever has both signing keys can write any past anew. Against both only copies help that have left the house: mails with a seal, bundles, a witness file on another disk (\`WITNESS_FILE\`), all taken by \`npm run check:store -- --against FILE…\`. What is **younger than the newest such copy** can be taken away unseen. A seal is made each day, with each bundle and summary and when asked, so the window is at most a day, and as short as a lead or auditor makes it by asking for a seal. Moved heads and forged entries inside the window are still seen by chain and signature unless the attacker also has the keys.

## Seen by nobody

${unseenList(results).join("\n")}

## The bundle's checks agree

On bundles that the app made after an attack, the page's check and check.sh came to the same verdict in **${made.filter((one) => one.page === one.script).length} of ${made.length}**.${made.length < agreements.length ? ` After ${agreements.length - made.length} more the app could not append to the log any more, so there was no bundle: an entry that somebody puts behind the last one with the hash of an earlier one leaves no place for the next.` : ""} Asked of these attacks, because each alters what a bundle holds: changed rows of the log at first, middle and last place, forged appends, another key, cut tails, changed rows that the record is made from. Not asked of attacks on seals, accounts, heads and other drives: a bundle of this case is the same with and without them, byte for byte but for its seal.

| attack | the page | check.sh | first fault that the page names |
|---|---|---|---|
${agreements.map(({ name, page, script, first }) => `| ${name} | ${page} | ${script} | ${first.replace(/\|/g, "/")} |`).join("\n")}

## No false alarms

${honest}

## Checks left out on purpose

${mutants}

## Every cell

${cellTable(results).join("\n")}
`;
}
