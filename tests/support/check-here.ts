import { readFileSync } from "node:fs";
import path from "node:path";
import { Transaction } from "sequelize";
import { env } from "@/lib/env";
import { connection } from "@/models";
import { type Looked, lookAtDatabase } from "@/scripts/check/store";

/** The check's look at the database as it is now; what `npm run check:store` does before it reads any file. */
export async function lookNow(tx?: Transaction): Promise<Looked> {
  const key = readFileSync(path.join(env().dataDir, "keys", "log-key.pub.pem"), "utf8");
  if (tx) return lookAtDatabase(tx, key);
  return connection().transaction({ isolationLevel: Transaction.ISOLATION_LEVELS.REPEATABLE_READ }, (look) => lookAtDatabase(look, key));
}

/** What a look found, in short: "Seal 3: seal-leaves", "Case 26-0001, Drive A 17: signature". */
export const inShort = ({ damage }: Pick<Looked, "damage">) => damage.map(({ place, seq, problem }) => `${place}${seq === null ? "" : ` ${seq}`}: ${problem}`);
