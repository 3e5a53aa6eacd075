import { readdirSync, readFileSync } from "node:fs";
import { builtinModules } from "node:module";
import path from "node:path";
import { expect, it } from "vitest";

/**
 * Who may import whom: the table of DEVELOPERS.md. The longest room that fits a file decides; a room's own files are
 * always free to it.
 */
const CHANGES = /^(models|storage)(\/|$)|^lib\/(core|schemas|commands|queries|mail|engine|report)\/|^lib\/(env|errors|limits|views|auth\/(password|token|attempts))$/;
const PARTS = "(components\\/(ui|shell|strip|print)|lib\\/core|lib\\/schemas)\\/|^lib\\/(limits|http\\/send)$";
const ROOMS: Record<string, RegExp> = {
  "app": /^(components|lib)\//,
  "components": new RegExp(`^${PARTS}`),
  // a page about something larger is put together from the parts of what lies in it, never the other way round
  ...Object.fromEntries(["case", "bench", "decision", "compare", "find", "audit"].map((noun) => [`components/${noun}`, new RegExp(`^components/(drive|custody|chip|composite|photo|note)/|^${PARTS}`)])),
  "components/drive": new RegExp(`^components/(custody|chip|photo)/|^${PARTS}`),
  // a composite lies in a chip: its page shows the votes and makes one
  "components/chip": new RegExp(`^components/(composite|photo)/|^${PARTS}`),
  "lib/commands": CHANGES,
  "lib/queries": CHANGES,
  "lib/core": /^lib\/core\//,
  "lib/schemas": /^lib\/core\/|^lib\/limits$/,
  "lib/auth": /^lib\/|^models(\/|$)/,
  "lib/http": /^lib\/|^(models|storage)(\/|$)/,
  "lib/engine": /^lib\/core\//,
  // a document from plain data: nothing of rows or images
  "lib/report": /^lib\/core\//,
  "lib/mail": /^lib\/|^models(\/|$)/,
  "models": /^lib\/(env|errors)$|^lib\/core\//,
  "storage": /^lib\/(env|errors|core\/digest)$/,
  "scripts": /^(?!app\/|components\/)/,
};
const CORE_PACKAGES = ["zod", "canonicalize", "crc-32", "@noble/curves/ed25519.js", "@noble/hashes/sha2.js", "@zip.js/zip.js/lib/zip-core-custom.js"];
/** `import x from "y"`, `export * from "y"`, `import "y"`, `import("y")`, `require("y")` */
const IMPORT = /(?:^|\n)\s*(import|export)\s+(type\s)?(?:[^"';]*?\sfrom\s*)?"([^"]+)"|\b(?:import|require)\(\s*"([^"]+)"\s*\)/g;

const root = path.resolve(import.meta.dirname, "../..");
const files = ["app", "components", "lib", "models", "storage", "scripts"].flatMap((folder) =>
  readdirSync(path.join(root, folder), { recursive: true, encoding: "utf8" })
    .filter((name) => /\.(ts|tsx|mjs)$/.test(name)).map((name) => path.posix.join(folder, name.replaceAll(path.sep, "/"))));

function refused(file: string): string[] {
  const room = Object.keys(ROOMS).filter((name) => file.startsWith(`${name}/`)).sort((a, b) => b.length - a.length)[0];
  if (!room) return [];
  return [...readFileSync(path.join(root, file), "utf8").matchAll(IMPORT)].flatMap(([, , typeOnly, from, called]) => {
    const specifier = from ?? called;
    const own = specifier.startsWith("@/") ? specifier.slice(2) : specifier.startsWith(".") ? path.posix.join(path.posix.dirname(file), specifier) : null;
    if (own === null) {
      const foreign = room === "lib/core" && !CORE_PACKAGES.includes(specifier);
      const node = room.startsWith("components") && (specifier.startsWith("node:") || builtinModules.includes(specifier));
      return foreign || node ? [`${file} imports ${specifier}`] : [];
    }
    const named = own.replace(/\.(ts|tsx|js|mjs|css)$/, "");
    // what a page gets is a view: components know its type, never how it is made
    const viewType = (room.startsWith("components") || room === "lib/report") && typeOnly !== undefined && named === "lib/views";
    // components are one folder per noun, each a room of its own
    const home = room.startsWith("components") ? path.posix.dirname(file) : room;
    const allowed = named.startsWith(`${home}/`) || named === home || viewType || ROOMS[room].test(named);
    return allowed ? [] : [`${file} imports ${own}`];
  });
}

it("keeps each room to what it may import", () => {
  expect(files.length).toBeGreaterThan(20);
  expect(files.flatMap(refused)).toEqual([]);
});
