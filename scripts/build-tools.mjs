import { existsSync, mkdirSync, readFileSync, renameSync, rmSync, statSync, writeFileSync } from "node:fs";
import path from "node:path";
import { pathToFileURL } from "node:url";
import { root } from "./start/say.mjs";

// Command-line tools and worker threads as plain JavaScript in dist/: they start at once, and Node runs no TypeScript in
// a worker. Part of `npm run build`; a tool whose sources have changed since is made again when it is called.
const folder = path.join(root, "dist");

/** dist/NAME.mjs and what it is made of. A worker of the app is one line more. */
export const TOOLS = {
  "engine-worker": "lib/engine/worker.ts",
  "inspect": "scripts/inspect.ts",
  "check-bundle": "scripts/check-bundle.ts",
  "bench-engine": "scripts/bench/engine.ts",
};

export const toolFile = (name) => path.join(folder, `${name}.mjs`);
const listFile = (name) => path.join(folder, `${name}.sources.json`);
const changed = (file) => (existsSync(file) ? statSync(file).mtimeMs : Infinity);

/** Whether a tool is missing or older than anything it was made of. */
export function isStale(name) {
  if (!existsSync(toolFile(name)) || !existsSync(listFile(name))) return true;
  const made = statSync(toolFile(name)).mtimeMs;
  return JSON.parse(readFileSync(listFile(name), "utf8")).some((source) => changed(path.join(root, source)) > made);
}

/** Whole files only: two builds at once must not mix. */
function put(file, content) {
  const half = `${file}.${process.pid}`;
  writeFileSync(half, content);
  renameSync(half, file);
}

export async function buildTool(name) {
  const { build } = await import("esbuild");
  const { outputFiles, metafile } = await build({
    entryPoints: [path.join(root, TOOLS[name])], absWorkingDir: root, bundle: true, write: false, metafile: true, outfile: toolFile(name),
    platform: "node", format: "esm", target: "node20", logLevel: "warning", tsconfig: path.join(root, "tsconfig.json"),
    // packages of the CommonJS kind look for it
    banner: { js: 'import { createRequire } from "node:module"; const require = createRequire(import.meta.url);' },
  });
  mkdirSync(folder, { recursive: true });
  rmSync(listFile(name), { force: true });
  put(toolFile(name), outputFiles[0].contents);
  put(listFile(name), JSON.stringify(Object.keys(metafile.inputs)));
}

export async function buildTools() {
  for (const name of Object.keys(TOOLS)) await buildTool(name);
}

export const toolsMissing = () => Object.keys(TOOLS).some((name) => !existsSync(toolFile(name)));

if (import.meta.url === pathToFileURL(process.argv[1] ?? "").href) await buildTools();
