import { existsSync } from "node:fs";
import path from "node:path";
import { pathToFileURL } from "node:url";
import { buildTool, isStale, toolFile } from "../build-tools.mjs";
import { checkNode } from "../start/packages.mjs";
import { giveUp, Refusal, root } from "../start/say.mjs";

// `npm run inspect`: the built tool; after a change in its sources it is built again first, which takes a moment.
try {
  checkNode();
  if (isStale("inspect")) {
    if (!existsSync(path.join(root, "node_modules/esbuild"))) throw new Refusal("The packages are not there yet. Run npm start or npm ci once, then this again.");
    await buildTool("inspect");
  }
  await import(pathToFileURL(toolFile("inspect")).href);
} catch (error) {
  giveUp(error, 2);
}
