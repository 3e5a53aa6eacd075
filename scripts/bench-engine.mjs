import { spawnSync } from "node:child_process";
import { createCipheriv, createHash } from "node:crypto";
import { mkdirSync, rmSync, writeFileSync } from "node:fs";
import os from "node:os";
import path from "node:path";
import { buildTool, toolFile } from "./build-tools.mjs";
import { giveUp, root, say } from "./start/say.mjs";

// `npm run bench:engine`: the engine on files, as ratios to sha256sum and cmp in the same run. The report goes to
// docs/bench-engine.md. What a loaded server does meanwhile is measured by bench:upload.
const MIB = 1024 * 1024;
const ROUNDS = Number(process.env.BENCH_ROUNDS ?? 7);
const folder = path.join(root, ".data/bench-engine");

const sorted = (list) => [...list].sort((a, b) => a - b);
const median = (list) => sorted(list)[Math.floor(list.length / 2)];
const range = (list, digits) => `${median(list).toFixed(digits)} (${Math.min(...list).toFixed(digits)} to ${Math.max(...list).toFixed(digits)})`;

/** Dense bytes, the same in every run. */
function dense(seed, size) {
  const key = createHash("sha256").update(seed).digest();
  return createCipheriv("aes-256-ctr", key, Buffer.alloc(16)).update(Buffer.alloc(size));
}

/** What a chip holds: dense parts, code-like parts, text and long blank stretches. */
function mixed(size) {
  const out = dense("mixed", size);
  const part = Math.max(1, Math.floor(size / 16));
  out.fill(0xff, 4 * part, 7 * part);
  out.fill(0x00, 9 * part, 10 * part);
  for (let at = 10 * part; at < 12 * part; at += 1) out[at] = 0x20 + (out[at] % 0x5f);
  for (let at = 12 * part; at < 15 * part; at += 1) out[at] = out[at] & (at % 4 === 3 ? 0xe0 : 0xff);
  return out;
}

function flipped(bytes, count, step) {
  const out = Buffer.from(bytes);
  for (let i = 0; i < count; i += 1) out[(i * step + 17) % out.length] ^= 1 << (i & 7);
  return out;
}

/** From `from` on every bit one place later, as after a missed clock. */
function slipped(bytes, from, bits) {
  const out = Buffer.from(bytes);
  for (let i = from; i < out.length - 1; i += 1) out[i] = ((bytes[i] << bits) | (bytes[i + 1] >> (8 - bits))) & 0xff;
  return out;
}

const file = (name, bytes) => {
  const at = path.join(folder, name);
  writeFileSync(at, bytes);
  return at;
};

function measure(...words) {
  const { status, stdout, stderr } = spawnSync(process.execPath, [toolFile("bench-engine"), ...words.map(String)], { encoding: "utf8" });
  if (status !== 0) throw new Error(`${words[0]} ${words[1]} ended with ${status}: ${stderr}`);
  return JSON.parse(stdout);
}
const ratioOf = (task, files, yardFiles) => {
  const { took, yard } = measure("ratio", task, ROUNDS, ...files, "--", ...yardFiles);
  return { ratios: took.map((ms, i) => ms / yard[i]), took, yard };
};
const aim = (value, most) => (value <= most ? "kept" : "**not kept**");

/** (d): nanoseconds a byte of the whole verdict on two reads that differ in one bit a KiB. */
function growth() {
  return [64, 1024, 16 * 1024, 256 * 1024, MIB, 4 * MIB, 16 * MIB, 64 * MIB].map((size) => {
    const image = mixed(size);
    const files = [file("grow-1.bin", image), file("grow-2.bin", flipped(image, Math.max(1, size >> 10), 1021))];
    const ms = median(measure("time", "verdict", size >= 16 * MIB ? 3 : 15, ...files).took);
    return { size, ms, nanoseconds: (ms * 1e6) / (2 * size) };
  });
}

/** (e): peak beyond a process that only holds the reads, as a multiple of the largest image. */
function memory(task, files, size) {
  const peaks = Array.from({ length: 3 }, () => measure("memory", task, ...files).maxRssKib);
  const held = Array.from({ length: 3 }, () => measure("memory", "bytes", ...files).maxRssKib);
  return { peak: median(peaks) / 1024, held: median(held) / 1024, times: ((median(peaks) - median(held)) * 1024) / size };
}

function sizeName(size) {
  return size >= MIB ? `${size / MIB} MiB` : size >= 1024 ? `${size / 1024} KiB` : `${size} B`;
}

try {
  await buildTool("bench-engine");
  rmSync(folder, { recursive: true, force: true });
  mkdirSync(folder, { recursive: true });
  const image = mixed(16 * MIB);
  const equal = [1, 2, 3].map((n) => file(`equal-${n}.bin`, image));
  const differ = [file("differ-1.bin", flipped(image, 500, 30011)), file("differ-2.bin", flipped(image, 800, 20011)), file("differ-3.bin", flipped(image, 1100, 15013))];
  const slips = [file("slip-1.bin", image), file("slip-2.bin", slipped(image, MIB, 1)), file("slip-3.bin", slipped(image, 3 * MIB, 3))];
  const foreign = [1, 2, 3].map((n) => file(`foreign-${n}.bin`, dense(`foreign ${n}`, 16 * MIB)));
  const large = mixed(64 * MIB);
  const big = [file("big-1.bin", flipped(large, 500, 130_003)), file("big-2.bin", flipped(large, 800, 80_021)), file("big-3.bin", large)];

  say("Ratios …");
  const a = ratioOf("digests-and-comparisons", equal, equal);
  const b = ratioOf("verdict", equal, equal);
  const c = ratioOf("verdict", differ, equal);
  const [slip, apart] = [ratioOf("verdict", slips, equal), ratioOf("verdict", foreign, equal)];
  const parts = Object.fromEntries(["bytes", "load", "compare", "inspect"].map((task) => [task, { equal: median(measure("time", task, ROUNDS, ...equal).took), differ: median(measure("time", task, ROUNDS, ...differ).took) }]));
  say("Growth …");
  const d = growth();
  say("Memory …");
  const [e16, e64] = [memory("verdict", differ, 16 * MIB), memory("verdict", big, 64 * MIB)];
  const slope = d[d.length - 1].nanoseconds / d.find((one) => one.size === MIB).nanoseconds;
  const ms = (n) => `${n.toFixed(0)} ms`;

  const report = `# Engine benchmark

Made by \`npm run bench:engine\` on ${os.cpus().length} processors, Node ${process.versions.node}: the engine as \`npm run inspect\` runs it, in one process,
files in the page cache, ${ROUNDS} rounds after one to warm up, each round right after its yardstick. The yardstick is one shell that runs \`sha256sum\`
of three equal files of 16 MiB and \`cmp\` of the first with both others. Ratios: median (least to most).

| | what | ratio | aim | |
|---|---|---|---|---|
| a | digests (SHA-256 and CRC-32) and both comparisons of three equal 16 MiB reads | ${range(a.ratios, 2)} | 1.5 | ${aim(median(a.ratios), 1.5)} |
| b | the whole verdict on them | ${range(b.ratios, 2)} | 4, better 2 | ${aim(median(b.ratios), 4)} |
| c | the whole verdict when all three differ (500 to 1,100 flipped bits each) | ${range(c.ratios, 2)} | 10 | ${aim(median(c.ratios), 10)} |
| c | the same, two of them slipped by bits from an early place on | ${range(slip.ratios, 2)} | 10 | ${aim(median(slip.ratios), 10)} |
| c | the same, three dense images with nothing in common | ${range(apart.ratios, 2)} | 10 | ${aim(median(apart.ratios), 10)} |

In milliseconds, medians: yardstick ${ms(median(a.yard))}; a ${ms(median(a.took))}, b ${ms(median(b.took))}, c ${ms(median(c.took))}.

## What limits each
Time of the parts on the same three files, each with the parts above it inside:

| part | three equal | three differing |
|---|---|---|
| files into memory | ${ms(parts.bytes.equal)} | ${ms(parts.bytes.differ)} |
| and SHA-256 and CRC-32 | ${ms(parts.load.equal)} | ${ms(parts.load.differ)} |
| files and first against both others, byte by byte | ${ms(parts.compare.equal)} | ${ms(parts.compare.differ)} |
| files, digests, and inspection with findings | ${ms(parts.inspect.equal)} | ${ms(parts.inspect.differ)} |

- a: SHA-256 of 48 MiB, as in the yardstick; comparing equal stretches goes by 32-bit words.
- b: one inspection, as equal digests share it; comparisons of equal digests cost nothing.
- c: three inspections, one for each content, while long stretches are equal; where nearly every byte differs, the three comparisons, which
  count bits and ranges byte by byte, and the search for a shift.

## d. Growth
Whole verdict on two reads that differ in one bit a KiB.

| size | time | nanoseconds a byte |
|---|---|---|
${d.map((one) => `| ${sizeName(one.size)} | ${one.ms.toFixed(one.ms < 10 ? 2 : 0)} ms | ${one.nanoseconds.toFixed(1)} |`).join("\n")}

From 1 MiB to 64 MiB the time a byte changes by the factor ${slope.toFixed(2)} (linear: 1; aim: at most 2): ${aim(slope, 2)}. Small images cost opening files and fixed tables.

## e. Peak memory
Peak of the whole process beyond one that only holds the reads, as a multiple of the largest image (aim: at most 4).

| reads | holding them | whole verdict | times the image | |
|---|---|---|---|---|
| 3 × 16 MiB, all differ | ${e16.held.toFixed(0)} MiB | ${e16.peak.toFixed(0)} MiB | ${e16.times.toFixed(2)} | ${aim(e16.times, 4)} |
| 3 × 64 MiB, all differ | ${e64.held.toFixed(0)} MiB | ${e64.peak.toFixed(0)} MiB | ${e64.times.toFixed(2)} | ${aim(e64.times, 4)} |

## f. Other requests meanwhile
Measured with the server: \`npm run bench:upload\` asks for the case list while eight images of 64 MiB are taken in and judged in
the engine's thread; the answer times stand in [bench-upload](bench-upload.md). A thread of its own keeps the judging from them.
`;
  mkdirSync(path.join(root, "docs"), { recursive: true });
  writeFileSync(path.join(root, "docs/bench-engine.md"), report);
  say(report);
  rmSync(folder, { recursive: true, force: true });
} catch (error) {
  giveUp(error);
}
