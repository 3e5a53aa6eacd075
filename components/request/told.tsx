import type { RequestAnswers } from "@/lib/schemas/request";
import { NONE, toldGroups } from "./told-words";

/** What a customer told us, as typed. Each value keeps its own reading direction: it comes from outside. */
export function Told({ answers, level = 3 }: { answers: RequestAnswers; level?: 3 | 4 }) {
  const Heading = `h${level}` as const;
  return (
    <div className="grid gap-4">
      {toldGroups(answers).map(({ title, lines }) => (
        <section key={title}>
          <Heading className="pb-1 font-semibold">{title}</Heading>
          <dl className="rq-told">
            {lines.map(({ term, text, mono }) => <div key={term} className="contents"><dt>{term}</dt><dd dir="auto" className={mono ? "font-mono" : text === NONE ? "text-ink-3" : ""}>{text}</dd></div>)}
          </dl>
        </section>
      ))}
    </div>
  );
}
