import { createHash } from "node:crypto";
import { parseArgs } from "node:util";
import { NotVerified } from "@/lib/core/verify/report";
import { fingerprintOf } from "@/lib/core/verify/seal";
import { plainTools, type VerifyTools } from "@/lib/core/verify/tools";
import { verifyBundle } from "@/lib/core/verify/verify-bundle";
import { bundlePage } from "./check/bundle-page";
import { openBundle } from "./check/bundle-source";

const USAGE = `npm run check:bundle -- FILE [KEY-FINGERPRINT] [--json]

Checks a case bundle, as a .zip or unpacked: its archive, lists, signatures, keys, custody logs, record and seal.
It needs no server and no database, changes nothing, and is the check of the page /verify.
  KEY-FINGERPRINT   64 hex digits of the log key or the seal key, from the mail or the summary; without it the
                    keys are not compared
  --json            for programs; with "npm run --silent" nothing else stands on standard output
Ends with 0: all in order. 1: something is not. 2: could not check.`;

// the digest from Node, which is quicker; signatures by the very code of the page
const tools: VerifyTools = { ...plainTools, createSha256: () => createHash("sha256") };

interface Asked {
  file: string;
  expectedKey: string | null;
  json: boolean;
}

/** Null when only help was asked for. Throws NotVerified. */
function askedFor(args: string[]): Asked | null {
  const { values, positionals } = parsed(args);
  if (values.help) return null;
  const [file, ...digits] = positionals;
  if (file === undefined) throw new NotVerified(`Name a bundle.\n${USAGE}`);
  const expectedKey = digits.length > 0 ? fingerprintOf(digits.join("")) : null;
  if (digits.length > 0 && expectedKey === null) throw new NotVerified("A key fingerprint has 64 hex digits. Check what you gave.");
  return { file, expectedKey, json: values.json ?? false };
}

function parsed(args: string[]) {
  try {
    return parseArgs({ args, allowPositionals: true, options: { json: { type: "boolean" }, help: { type: "boolean", short: "h" } } });
  } catch (error) {
    throw new NotVerified(`${error instanceof Error ? error.message.split(". ")[0] : "The options can't be read"}.\n${USAGE}`);
  }
}

async function check(args: string[]): Promise<number> {
  const asked = askedFor(args);
  if (asked === null) {
    process.stdout.write(`${USAGE}\n`);
    return 0;
  }
  const { close, ...bundle } = await openBundle(asked.file);
  try {
    const report = await verifyBundle({ ...bundle, tools, expectedKey: asked.expectedKey, onProgress: ticker() });
    process.stdout.write(asked.json ? `${JSON.stringify({ file: asked.file, ...report }, null, 2)}\n` : bundlePage(report));
    return report.verdict === "in-order" ? 0 : 1;
  } finally {
    await close();
  }
}

/** Progress on standard error for whoever watches, from the third second on. */
function ticker(): (progress: { what: string }) => void {
  let last = Date.now();
  return ({ what }) => {
    if (!process.stderr.isTTY || Date.now() - last < 3000) return;
    last = Date.now();
    process.stderr.write(`Checking ${what}\n`);
  };
}

// whoever reads the output may stop early
process.stdout.on("error", (error: NodeJS.ErrnoException) => {
  if (error.code !== "EPIPE") throw error;
});

try {
  process.exitCode = await check(process.argv.slice(2));
} catch (error) {
  process.stderr.write(`${error instanceof NotVerified ? `Could not check: ${error.message}` : error instanceof Error ? error.stack : String(error)}\n`);
  process.exitCode = 2;
}
