import { connection } from "@/models";
import { exitCode, page } from "./check/report";
import { checkStore } from "./check/store";
import { CommandRefusal, reasonOf } from "./commands/run-command";

const USAGE = `npm run check:store [-- [--json] [--against FILE…]]

Checks every log, signature and seal, the rows that the logs tell of, and every stored image. It reports and never repairs.
  --against FILE…   also holds the database against files from outside: a seal.txt (with seal.sig beside it), a mail with
                    a seal, a case bundle, a witness file
  --json            for programs; with "npm run --silent" nothing else stands on standard output
Ends with 0: clean. 1: damage found. 2: could not check.`;

interface Asked {
  json: boolean;
  help: boolean;
  against: string[];
}

function askedFor(words: string[]): Asked {
  const asked: Asked = { json: false, help: false, against: [] };
  let files = false;
  for (const word of words) {
    if (word === "--json") asked.json = true;
    else if (word === "--help") asked.help = true;
    else if (word === "--against") files = true;
    else if (word.startsWith("-") || !files) throw new CommandRefusal(`This command does not know ${word}.\n${USAGE}`);
    else asked.against.push(word);
  }
  if (files && asked.against.length === 0) throw new CommandRefusal("Name the files to hold the database against, after --against.");
  return asked;
}

/** Progress for whoever watches, on standard error so that the report stays clean. */
function ticker(): (done: number, total: number) => void {
  let last = Date.now();
  return (done, total) => {
    if (Date.now() - last < 2000) return;
    last = Date.now();
    process.stderr.write(`Checked ${done} of ${total} images\n`);
  };
}

const json = process.argv.includes("--json");
try {
  const { help, against } = askedFor(process.argv.slice(2));
  if (help) console.log(USAGE);
  else {
    const report = await checkStore(against, ticker());
    console.log(json ? JSON.stringify(report, null, 2) : page(report));
    process.exitCode = exitCode(report);
  }
} catch (error) {
  const why = reasonOf(error) ?? (error as Error).message;
  if (json) console.log(JSON.stringify({ clean: false, notChecked: [why] }, null, 2));
  console.error(`Could not check: ${why}`);
  process.exitCode = 2;
} finally {
  await connection().close();
}
