import { askedFor, NotInspected, USAGE } from "./inspect/arguments";
import { comparePairs, judgeReads, verdictOf } from "./inspect/judge";
import { loadReads } from "./inspect/load";
import { jsonOf, pageOf } from "./inspect/page";

// `npm run inspect`: the engine on files, without server or database. The shape and the exit codes are API.md's.
async function inspect(words: string[]): Promise<number> {
  const asked = askedFor(words);
  if (asked === null) {
    process.stdout.write(`${USAGE}\n`);
    return 0;
  }
  const reads = await judgeReads(loadReads(asked), asked.size);
  const pairs = comparePairs(reads, asked.size);
  const verdict = verdictOf(reads, pairs, asked.size);
  process.stdout.write((asked.json ? jsonOf : pageOf)(reads, pairs, verdict));
  return verdict.ready ? 0 : 1;
}

// whoever reads the output may stop early
process.stdout.on("error", (error: NodeJS.ErrnoException) => {
  if (error.code !== "EPIPE") throw error;
});

try {
  process.exitCode = await inspect(process.argv.slice(2));
} catch (error) {
  process.stderr.write(`${error instanceof NotInspected ? error.message : error instanceof Error ? error.stack : String(error)}\n`);
  process.exitCode = 2;
}
