import { writeFileSync } from "node:fs";
import path from "node:path";
import { ENGINE_VERSION } from "@/lib/core/engine-version";
import { realImages } from "./real-images";
import { falseAlarms, shareRight, sweep, type Outcome } from "./sweep";

/** Writes docs/engine-confusion.md. Argument: how many seeds, 3 unless said. */

const seeds = Array.from({ length: Number(process.argv[2] ?? 3) }, (_, n) => n + 1);
const percent = (share: number) => `${(share * 100).toFixed(2)} %`;

function table(outcomes: readonly Outcome[]): string {
  const kinds = [...new Set(outcomes.map((one) => one.injection))];
  const rows = kinds.map((kind) => {
    const of = outcomes.filter((one) => one.injection === kind);
    const codes = new Map<string, number>();
    for (const { code } of of) codes.set(code, (codes.get(code) ?? 0) + 1);
    const said = [...codes].sort((a, b) => b[1] - a[1]).map(([code, n]) => `${n} ${code}`).join(", ");
    return `| ${kind} | \`${of[0].expected}\` | ${of.filter((one) => one.code === one.expected).length} of ${of.length} | ${said} |`;
  });
  return ["| fault | right code | right | said |", "|---|---|---|---|", ...rows].join("\n");
}

const images = realImages();
const outcomes = sweep(images, seeds, (name) => process.stderr.write(`${name}\n`));
const [full, empty] = [outcomes.filter((one) => !one.nearlyEmpty), outcomes.filter((one) => one.nearlyEmpty)];
const missed = outcomes.filter((one) => !one.held);
const alarms = falseAlarms(images);

const report = `# Faults put into real images, and what the engine calls them

Made by \`node --import tsx scripts/engine/confusion.ts ${seeds.length}\` with engine version ${ENGINE_VERSION}: ${images.length} distinct firmware images of the Debian packages seabios, ovmf and ipxe-qemu, seeds ${seeds[0]} to ${seeds[seeds.length - 1]}, ${outcomes.length} faults. A fault that changes no byte of an image is left out. Bursts, foreign blocks and slips are put where there is data: in padding they can't be seen, or look like something else. Nearly empty: more than half of all bytes have one value.

- Right code on images that are not nearly empty: **${percent(shareRight(full))}** of ${full.length}.
- Right code on nearly empty images: ${percent(shareRight(empty))} of ${empty.length}.
- Faults that left the set ready for approval: **${missed.length}** of ${outcomes.length}.
- Findings above \`note\` on unharmed images: **${alarms.length}** of ${images.length} images.
${[...missed.map((one) => `- Left ready: ${one.injection} in ${one.image}, seed ${one.seed}.`), ...alarms.map((one) => `- False alarm: ${one}.`)].join("\n")}
## Images that are not nearly empty

${table(full)}

## Nearly empty images

${table(empty)}
`;
writeFileSync(path.join(import.meta.dirname, "../../docs/engine-confusion.md"), report);
process.stdout.write(`${percent(shareRight(full))} right on full images, ${percent(shareRight(empty))} on nearly empty ones, ${missed.length} left ready, ${alarms.length} false alarms\n`);
process.exitCode = missed.length + alarms.length > 0 || shareRight(full) < 0.97 ? 1 : 0;
