import { writeFileSync } from "node:fs";
import path from "node:path";
import { introduceKey } from "@/lib/commands/introduce-key";
import { sendSummary } from "@/lib/commands/send-summary";
import { env } from "@/lib/env";
import { connection } from "@/models";
import { makeAround } from "./demo/around";
import { makeFinished } from "./demo/finished";
import { makeOpen } from "./demo/open";
import { makeStaff } from "./demo/people";
import { makeReturned } from "./demo/returned";
import { makeShelf } from "./demo/shelf";

// Fills an empty database with the demo workshop, through the commands that the pages use. `npm start` runs it once.
try {
  await introduceKey();
  const { staff, lines } = await makeStaff();
  const { summaryFor } = await makeFinished(staff);
  const shown = await makeOpen(staff);
  await makeShelf(staff);
  await makeAround(staff, shown);
  const returned = await makeReturned(staff);
  for (const caseId of [summaryFor, returned]) await sendSummary(staff.ines, caseId);
  writeFileSync(path.join(env().dataDir, "first-sign-in.txt"), `${lines.join("\n")}\n`, { mode: 0o600 });
} finally {
  await connection().close();
}
