import { createHash } from "node:crypto";
import { existsSync, readFileSync, readdirSync, rmSync, writeFileSync } from "node:fs";
import path from "node:path";
import { buildTools, toolsMissing } from "../build-tools.mjs";
import { once } from "./once.mjs";
import { progress, root } from "./say.mjs";

const LOCK_STAMP = path.join(root, "node_modules/.twinread-lock");
const BUILD_STAMP = path.join(root, ".next/twinread-build");

/** What the build is made of; a change in any of it means building again. */
const SOURCES = [
  "app", "components", "lib", "models", "storage", "migrations", "public", "proxy.ts", "instrumentation.ts",
  "next.config.mjs", "tailwind.config.ts", "postcss.config.mjs", "tsconfig.json", "package.json", "package-lock.json",
  // what the tools in dist/ are made of besides lib
  "scripts/build-tools.mjs", "scripts/inspect.ts", "scripts/inspect", "scripts/bench",
];

const read = (file) => (existsSync(file) ? readFileSync(file, "utf8").trim() : "");
const lockHash = () => createHash("sha256").update(readFileSync(path.join(root, "package-lock.json"))).digest("hex");

export const needsInstall = () => read(LOCK_STAMP) !== lockHash();
export const needsBuild = () => !existsSync(path.join(root, ".next/BUILD_ID")) || toolsMissing() || read(BUILD_STAMP) !== sourcesHash();

export async function ensureInstalled() {
  if (!needsInstall()) return;
  rmSync(LOCK_STAMP, { force: true });
  // the build needs the development packages too, whatever NODE_ENV says
  await progress("Fetching the packages", () => once("npm", ["ci", "--include=dev", "--no-audit", "--no-fund"]));
  writeFileSync(LOCK_STAMP, `${lockHash()}\n`);
}

/** Builds the app when its sources changed since the last build. */
export async function ensureBuilt() {
  const hash = sourcesHash();
  if (!needsBuild()) return;
  rmSync(BUILD_STAMP, { force: true });
  const env = { ...process.env, NODE_ENV: "production", NEXT_TELEMETRY_DISABLED: "1" };
  // the build has no business with any database
  delete env.DATABASE_URL;
  delete env.DATABASE_ADMIN_URL;
  try {
    await progress("Building the app", () => once(process.execPath, ["node_modules/next/dist/bin/next", "build"], { env }));
    await buildTools();
  } catch (error) {
    // the bundler remembers a missing file even after it is there: the next attempt begins without its memory
    rmSync(path.join(root, ".next"), { recursive: true, force: true });
    throw error;
  }
  writeFileSync(BUILD_STAMP, `${hash}\n`);
}

/** SHA-256 over path and content of every source file, in the order of their paths. */
export function sourcesHash() {
  const sum = createHash("sha256");
  for (const name of SOURCES) add(sum, name);
  return sum.digest("hex");
}

function add(sum, name) {
  const file = path.join(root, name);
  let entries;
  try {
    entries = readdirSync(file);
  } catch (error) {
    if (error.code === "ENOENT") return;
    if (error.code !== "ENOTDIR") throw error;
    sum.update(`${name}\0`).update(createHash("sha256").update(readFileSync(file)).digest());
    return;
  }
  for (const entry of entries.sort()) add(sum, `${name}/${entry}`);
}
