import { existsSync, readFileSync } from "node:fs";
import path from "node:path";
import { expect, it } from "vitest";

const root = path.resolve(import.meta.dirname, "../..");
/** What only dialogs and rules of forms need: fetched when asked for (`whenAsked`, `rulesFrom`), in no page's own scripts. */
const HEAVY = ["zod", "radix-ui", "@hookform/resolvers/zod", "next-auth/react"];
const PAGES = ["bench", "chips/[id]", "chips/[id]/compare", "chips/[id]/decision", "cases/[id]", "drives/[id]", "drives/[id]/custody", "shelf", "shelf/[id]"];
/** value imports that come with a file: no types, no import() */
const CARRIED = /(?:^|\n)(?:import|export)\s+(?!type\s)(?:[^"';]*?\sfrom\s*)?"([^"]+)"/g;

function resolved(from: string, specifier: string): string | null {
  const bare = specifier.startsWith("@/") ? specifier.slice(2) : specifier.startsWith(".") ? path.posix.join(path.posix.dirname(from), specifier) : null;
  // what the page itself asks of the server stays there: only its parts come to the browser
  if (bare === null || !(from.startsWith("app/") ? /^components\// : /^(components|lib\/(core|schemas|http\/send|limits))/).test(bare)) return null;
  return [`${bare}.tsx`, `${bare}.ts`].find((name) => existsSync(path.join(root, name))) ?? null;
}

/** Each heavy package that a page's parts carry, with the way to it. */
function carried(page: string): string[] {
  const ways = new Map([[page, page]]);
  const found: string[] = [];
  for (const [file, way] of ways) {
    for (const [, specifier] of readFileSync(path.join(root, file), "utf8").matchAll(CARRIED)) {
      if (HEAVY.includes(specifier)) found.push(`${way} > ${specifier}`);
      const next = resolved(file, specifier);
      if (next && !ways.has(next)) ways.set(next, `${way} > ${next}`);
    }
  }
  return found;
}

it.each(PAGES)("the page %s carries nothing that only a dialog or the rules of a form need", (page) => {
  expect(carried(`app/(desk)/${page}/page.tsx`)).toEqual([]);
});
