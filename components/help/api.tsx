import { Fragment } from "react";
import { IDEMPOTENCY_DAYS, MAX_CALL_BYTES, MAX_FILES_A_CALL, MAX_IMAGE_BYTES, MIB } from "@/lib/limits";
import { API_EXAMPLES } from "./api-examples";
import { Commands, HelpTable, Part, Points, WidePart } from "./prose";

/** A route as the page lists it; who asks for the description as a file gets more. */
export interface ApiRoute {
  method: string;
  path: string;
  who: string;
  summary: string;
}

/** An address may break before a slash, and nowhere else. */
function Call({ method, path }: { method: string; path: string }) {
  return <code className="font-normal">{method} {path.split("/").slice(1).map((part, i) => <Fragment key={i}><wbr /><span className="whitespace-nowrap">/{part}</span></Fragment>)}</code>;
}

const STATUSES: [string, string][] = [
  ["400", "The request is malformed: JSON or multipart."],
  ["401", "No sign-in, or a token that isn’t known or was withdrawn."],
  ["403", "Your role may not do this."],
  ["404", "Not there, or not yours to know of."],
  ["405, 415", "The address doesn’t take this method, or this kind of content."],
  ["409", "A rule of the work stands against it; detail says which."],
  ["413", "Too large."],
  ["422", "Input or digest doesn’t fit; errors names the fields."],
  ["429", "Too many requests. Wait as long as Retry-After says."],
  ["503, 507", "Database or store is away, or there is no room. Nothing was done by half; try again."],
];

export function ApiHelp({ address, routes }: { address: string; routes: readonly ApiRoute[] }) {
  return (
    <>
      <Part title="What it is for" first>
        <p>The pages use this interface themselves, and a script at the bench can use it as well: to send reads as they are taken, to ask for a chip’s state, to fetch the approved image. The routes of the table below stay as they are. The whole description as a file, in OpenAPI 3.1, is <a href="/api/openapi.json">openapi.json</a>.</p>
      </Part>
      <Part title="Sign-in">
        <p>Make a bench token on the page Account; it is shown once. Send it with every call as <code>Authorization: Bearer $TOKEN</code>. It has your role, and what it does stands in the log under your name: use one for each bench, and withdraw it when the bench is gone. Don’t put it into a command that others can see; read it from a file that only you can open:</p>
        <Commands label="Set the address and the token">{`TWINREAD=${address}\nTOKEN=$(cat ~/.twinread-token)`}</Commands>
      </Part>
      <Part title="Rules">
        <Points>
          <li>Answers are JSON. Names are in camelCase, sizes in bytes, digests in lower-case hex, times in UTC (RFC 3339), ids are UUIDs.</li>
          <li>A writing call may carry an <code>Idempotency-Key</code>, kept for {IDEMPOTENCY_DAYS} days: the same request again gives the same answer and does nothing twice. Another request under the same key is 422. Use one for every upload, then a lost connection costs nothing.</li>
          <li>An upload holds 1 to {MAX_FILES_A_CALL} files, each at most {MAX_IMAGE_BYTES / MIB} MiB, {MAX_CALL_BYTES / MIB} MiB in all. Content never refuses a read: what is stored is judged, and the findings come with the answer.</li>
          <li>Lists take <code>q</code>, <code>sort</code>, <code>order</code>, <code>page</code> and <code>pageSize</code>, and answer <code>{"{items, total, page, pageSize}"}</code>.</li>
        </Points>
      </Part>
      <WidePart title="Errors" note="application/problem+json, RFC 9457.">
        <HelpTable caption="What an error’s status means" head={["Status", "Means"]} rows={STATUSES.map(([status, means]) => ({ key: status, cells: [status, means] }))} />
      </WidePart>
      <WidePart title="Examples" note="One job from the first call to the last. Names in capitals are variables of your shell.">
        {API_EXAMPLES.map(({ key, title, about, command, status, answer, gives }) => (
          <article key={key} id={key} aria-labelledby={`${key}-title`} className="grid gap-2 border-b border-rule py-4 first:pt-0 last:border-0 print:break-inside-avoid">
            <h3 id={`${key}-title`} className="text-t4 font-bold">{title}</h3>
            <p className="max-w-[53ch] text-t4">{about}</p>
            <Commands label={`Command: ${title}`}>{command}</Commands>
            <p className="text-t3 text-ink-2 [overflow-wrap:anywhere]">Answers <b>{status}</b>{gives ? <>. Keep the id in it as <code>{gives}</code></> : <>; in it stands <code>{answer.trim()}</code></>}.</p>
          </article>
        ))}
      </WidePart>
      <WidePart title="Routes" note="Those that stay as they are.">
        <HelpTable caption="Routes of the interface" head={["Call", "For", "What"]} rows={routes.map(({ method, path, who, summary }) => ({ key: `${method} ${path}`, cells: [<Call key="call" method={method} path={path} />, who, summary] }))} />
      </WidePart>
    </>
  );
}
