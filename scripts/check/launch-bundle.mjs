import { launchTool } from "../launch-tool.mjs";

// `npm run check:bundle`
await launchTool("check-bundle");
