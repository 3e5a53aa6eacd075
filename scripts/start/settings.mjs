import { existsSync } from "node:fs";
import path from "node:path";
import { adminUrl, appUrl } from "./database.mjs";
import { readSecretFile } from "./folder.mjs";
import { Refusal, root } from "./say.mjs";

/** `.env` at the root, if there is one; what the environment already holds wins. */
export function loadEnvFile() {
  const file = path.join(root, ".env");
  if (existsSync(file)) process.loadEnvFile(file);
}

/** Settings through the app's own parser, so that there is one. Needs the packages. */
export async function loadSettings(variables = process.env) {
  const { tsImport } = await import("tsx/esm/api");
  const { readSettings } = await tsImport("../../lib/settings.ts", import.meta.url);
  try {
    return readSettings(variables, root, true);
  } catch (error) {
    if (!Array.isArray(error.problems)) throw error;
    throw new Refusal(`These settings stand in the way (see .env.example):\n${error.problems.map((line) => `  - ${line}`).join("\n")}`);
  }
}

export const isEmbedded = (settings) => settings.databaseUrl === null;

/** The environment of the app and of everything that works with its rights. It never holds the migrating user. */
export function appVariables(settings, dbPort = settings.dbPort) {
  return {
    ...process.env,
    PORT: String(settings.port),
    HOST: settings.host,
    PUBLIC_URL: settings.publicUrl,
    TWINREAD_DATA: settings.dataDir,
    DB_PORT: String(dbPort),
    MAIL_PORT: String(settings.mailPort),
    DEMO: settings.demo ? "1" : "0",
    DATABASE_URL: settings.databaseUrl ?? appUrl(settings.dataDir, dbPort),
    // empty, not absent: Next reads .env too and fills in what is absent
    DATABASE_ADMIN_URL: "",
    NEXTAUTH_SECRET: readSecretFile(settings.dataDir, "session-secret"),
    NEXTAUTH_URL: settings.publicUrl,
    NEXT_TELEMETRY_DISABLED: "1",
  };
}

/** The environment of the migrations, and of nothing else. */
export function adminVariables(settings, dbPort = settings.dbPort) {
  return { ...appVariables(settings, dbPort), DATABASE_ADMIN_URL: settings.databaseAdminUrl ?? adminUrl(settings.dataDir, dbPort) };
}

/** Arguments that let Node run a TypeScript file of the server side. */
export const tsArgs = (script, args = []) => ["--conditions=react-server", "--import", "tsx", script, ...args];
