import { readFileSync, writeFileSync } from "node:fs";
import { availableParallelism, loadavg } from "node:os";
import path from "node:path";
import type { Browser } from "@playwright/test";
import { atTheDemo, signedIn } from "./pictures/demo";
import { largeChips } from "./pages/large";
import { type Load, measured } from "./pages/measure";
import { type Row, scrolled, tableOf } from "./pages/report";
import { scenes } from "./pages/scenes";
import { byDragging, byPageKey, byWheel, traced } from "./pages/scroll";

// `npm run bench:pages`: weight and speed of the pages of the demo that runs on this data folder; figures in docs/pages.md.
// With `-- --large` the same for the largest chips, which are recorded there first: use a demo of its own for it.
// Ends with 1 where a weight or CLS that is asked for isn't kept; times depend on the machine and are told only.
const report = path.join(import.meta.dirname, "../docs/pages.md");
const LARGE_HEADING = "## The largest chips";
const busy = () => `${availableParallelism()} processors, Node ${process.versions.node}, load ${loadavg()[0].toFixed(1)} when it began`;

function write(part: "pages" | "large", text: string): void {
  const [pages, large = ""] = readFileSync(report, { encoding: "utf8", flag: "a+" }).split(`${LARGE_HEADING}\n`);
  const parts = part === "pages" ? [text, large] : [pages, text];
  writeFileSync(report, `${parts[0].trim()}\n${parts[1] ? `\n${LARGE_HEADING}\n${parts[1].trim()}\n` : ""}`);
}

async function pages(browser: Browser): Promise<void> {
  const began = busy();
  const all = await scenes(browser);
  const empty: Load = await measured(all[0].page, "/nothing-here");
  const rows: Row[] = [];
  for (const scene of all) {
    rows.push({ ...scene, load: await measured(scene.page, scene.address) });
    console.log(tableOf(rows.slice(-1), empty).lines[0]);
  }
  const { text, kept } = tableOf(rows, empty);
  write("pages", `# Weight and speed of the pages

Made by \`npm run bench:pages\` on ${began}: the demo and Chromium on the same machine, 1440 by 1000, each figure the median
of three loads with nothing kept from an earlier one (CLS: the most of the three).

- JavaScript is what comes over the wire until the network is idle, above what an empty page of the same build needs (${(empty.js / 1000).toFixed(1)} KB, "not found"). 1 KB is 1,000 bytes.
- First content: the browser's first contentful paint.
- Ready: every link, button and field of the page has been taken over by React, and no piece of work over 50 ms comes after it; else the end of the last one.
- Dialogs and the rules of forms come when they are asked for and are in no figure.

${text}`);
  if (!kept) process.exitCode = 1;
}

async function large(browser: Browser): Promise<void> {
  const page = await signedIn(browser, "ines");
  console.log("Recording the largest chips, where this folder has none yet …");
  const { three, other, thirty } = await largeChips(page);
  const began = busy();
  const empty = await measured(page, "/nothing-here");
  const rows: Row[] = [];
  for (const [name, address] of [
    ["Chip of 64 MiB, 3 reads that differ in thousands of places", `/chips/${three}`], ["Chip of 64 MiB, 2 reads with nothing in common", `/chips/${other}`], ["Chip with 30 reads", `/chips/${thirty}`],
    ["Compare, 3 of 64 MiB", `/chips/${three}/compare`], ["Compare, 2 of 64 MiB with nothing in common", `/chips/${other}/compare`],
  ]) {
    rows.push({ name, load: await measured(page, address) });
    console.log(tableOf(rows.slice(-1), empty).lines[0]);
  }
  const moves: string[] = [];
  for (const [name, address, fold] of [["3 reads, folded", `/chips/${three}/compare`, true], ["3 reads, unfolded", `/chips/${three}/compare`, false], ["2 reads, everything differs", `/chips/${other}/compare`, true]] as const) {
    for (const [way, move] of [
      ["wheel, 3,000 px a second", () => byWheel(page, ".hex-scroll", 15_000, 3_000)],
      ["page by page", () => byPageKey(page, ".hex-scroll", 60)],
      ["scroll bar dragged through all of it", () => byDragging(page, ".hex-scroll", 300)],
    ] as const) {
      await page.goto(address);
      await page.waitForLoadState("networkidle");
      if (!fold) await page.getByLabel("Fold lines that agree").uncheck();
      moves.push(scrolled(name, way, await traced(page, move)));
      console.log(moves.at(-1));
    }
  }
  write("large", `Made by \`npm run bench:pages -- --large\` on ${began}.

${tableOf(rows, empty).text}

Scrolling the bytes, by the browser's own tracing: the time between one drawn frame and the next, and the longest piece of
work on the page's main thread meanwhile. Without a graphics processor: frames are drawn by the processor that also serves the
bytes. Aim: p95 under 20 ms.

| bytes | how | frames | p50 | p95 | longest | longest work |
|---|---|---|---|---|---|---|
${moves.join("\n")}`);
}

await atTheDemo(process.argv.includes("--large") ? large : pages);
