import { launchTool } from "../launch-tool.mjs";

// `npm run inspect`
await launchTool("inspect");
