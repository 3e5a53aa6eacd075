import { existsSync } from "node:fs";
import path from "node:path";
import { pathToFileURL } from "node:url";
import { buildTool, isStale, toolFile } from "./build-tools.mjs";
import { checkNode } from "./start/packages.mjs";
import { giveUp, Refusal, root } from "./start/say.mjs";

/** Runs a built tool in this process; after a change in its sources it is built again first, which takes a moment. */
export async function launchTool(name) {
  try {
    checkNode();
    if (isStale(name)) {
      if (!existsSync(path.join(root, "node_modules/esbuild"))) throw new Refusal("The packages are not there yet. Run npm start or npm ci once, then this again.");
      await buildTool(name);
    }
    await import(pathToFileURL(toolFile(name)).href);
  } catch (error) {
    giveUp(error, 2);
  }
}
