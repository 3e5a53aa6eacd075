import { keep, lastLines, launch, stopMarked } from "./child.mjs";
import { sleep } from "./process-id.mjs";
import { progress, Refusal } from "./say.mjs";
import { appVariables } from "./settings.mjs";

const READY_MS = 90_000;

/** Where this machine itself reaches the app. */
export function localUrl({ host, port }) {
  const name = host === "0.0.0.0" ? "127.0.0.1" : host === "::" ? "[::1]" : host.includes(":") ? `[${host}]` : host;
  return `http://${name}:${port}`;
}

/** Starts the app (one process) and keeps it running. */
export function keepApp({ settings, dev = false, variables = {}, onGiveUp, mostRestarts, control }) {
  let first = true;
  return keep({
    dataDir: settings.dataDir, name: "app", label: "The app", onGiveUp, mostRestarts, control,
    start: () => progress("Starting the app", async () => {
      const handle = await start({ settings, dev, variables, control, strict: first });
      first = false;
      return handle;
    }),
  });
}

async function start({ settings, dev, variables, control, strict }) {
  const { dataDir, host, port } = settings;
  const handle = launch({
    control, dataDir, name: "app", port, inherit: dev, command: process.execPath,
    args: ["node_modules/next/dist/bin/next", dev ? "dev" : "start", "-H", host, "-p", String(port)],
    env: { ...appVariables(settings), ...variables, NODE_ENV: dev ? "development" : "production" },
  });
  const until = Date.now() + READY_MS;
  let status = "no answer";
  while (Date.now() < until) {
    const how = handle.hasEnded();
    if (how) throw new Refusal(`${dev ? "" : `${lastLines(dataDir, "app")}\n`}The app ended while starting (${how}). Its last lines are above.`);
    try {
      status = (await fetch(`${localUrl(settings)}/api/health`, { signal: AbortSignal.timeout(10_000) })).status;
      // after a crash the app counts as back once it answers at all: the database may be the one that is away
      if (status === 200 || (!strict && status === 503)) return handle;
    } catch {
      status = "no answer";
    }
    await sleep(150);
  }
  await stopMarked(dataDir, "app", handle.mark);
  throw new Refusal(`${dev ? "" : `${lastLines(dataDir, "app")}\n`}The app did not become ready within ${READY_MS / 1000} s (last answer of /api/health: ${status}). Its last lines are above.`);
}
