import { readFileSync, statSync } from "node:fs";
import path from "node:path";
import packageJson from "../package.json";
import { readSettings, type SmtpSettings, type WorkshopContact } from "./settings";

/** What the app's process knows. The migrating user's address is not among it. */
export interface Env {
  port: number;
  host: string;
  /** origin without a trailing slash */
  publicUrl: string;
  /** absolute path of the data folder */
  dataDir: string;
  /** read when first asked for: the built-in database's password lies in the data folder */
  readonly databaseUrl: string;
  demo: boolean;
  workshop: string;
  /** lines; empty when not set */
  workshopAddress: string[];
  workshopHours: string | null;
  workshopContact: WorkshopContact;
  /** IANA name */
  timeZone: string;
  smtp: SmtpSettings;
  /** absolute path; every seal is appended to it */
  witnessFile: string;
  /** days within which each stored image is read whole again; 0: the check is off */
  scrubDays: number;
  /** MiB a second that the check reads at most */
  scrubMebibytesPerSecond: number;
  appVersion: string;
}

let known: Env | undefined;

/** Parsed once, at the first call: `next build` loads the code without any setting. Throws SettingsError. */
export function env(): Env {
  if (known) return known;
  const settings = readSettings(process.env, /* turbopackIgnore: true */ process.cwd(), false);
  const { port, host, publicUrl, dataDir, demo, workshop, workshopAddress, workshopHours, workshopContact, timeZone, smtp, witnessFile, scrubDays, scrubMebibytesPerSecond, dbPort, databaseUrl } = settings;
  known = {
    port, host, publicUrl, dataDir, demo, workshop, workshopAddress, workshopHours, workshopContact, timeZone, smtp, witnessFile, scrubDays, scrubMebibytesPerSecond,
    appVersion: packageJson.version,
    get databaseUrl() {
      return databaseUrl ?? `mariadb://twinread_app:${secretIn(dataDir, "db-app-password")}@127.0.0.1:${dbPort}/twinread`;
    },
  };
  return known;
}

/** A secret of this data folder, made once at the first start. Refuses a file that others can read. */
export function readSecret(name: string): string {
  return secretIn(env().dataDir, name);
}

function secretIn(dataDir: string, name: string): string {
  if (!/^[a-z0-9-]+$/.test(name)) throw new Error(`"${name}" is not the name of a secret`);
  const file = path.join(/* turbopackIgnore: true */ dataDir, "secrets", name);
  const found = statSync(file, { throwIfNoEntry: false });
  if (!found) throw new Error(`${file} is missing. Start Twinread with npm start, which makes it.`);
  if ((found.mode & 0o077) !== 0) {
    throw new Error(`${file} can be read by others. Set its mode to 0600; if somebody may have copied it, replace it.`);
  }
  return readFileSync(file, "utf8").trim();
}
