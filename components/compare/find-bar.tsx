"use client";

import { useRef, useState } from "react";
import { Button } from "@/components/ui/button";
import { controlClass } from "@/components/ui/field";
import { Icon } from "@/components/ui/icon";
import { Select } from "@/components/ui/select";
import { hexPairs, MOST_SOUGHT, type Found, type Way } from "@/lib/core/find-bytes";
import { countOf, listText, sizeText } from "@/lib/core/quantity";
import { address } from "@/lib/core/strip";
import { fetcher, Refusal } from "@/lib/http/send";
import type { ReadView } from "@/lib/views";
import type { Hit } from "./hex-table";

interface Place extends Found {
  side: number;
}

/** The nearest of what the reads hold, in the way's direction: what lies around the end comes after all that doesn't. */
function nearest(places: readonly Place[], way: Way): Place | null {
  const nearer = (a: Place, b: Place) => (a.around !== b.around ? b.around : way === "next" ? a.at < b.at : a.at > b.at);
  return places.reduce<Place | null>((best, place) => (best === null || nearer(place, best) ? place : best), null);
}

const WRITTEN = { bytes: "", "utf-8": "", "utf-16le": ", two bytes a character" };

/** Finds bytes or text in one of the reads or in any, from the address on, with where it was found. */
export function FindBar({ reads, names, at, hit, sizeBytes, onFound }: { reads: readonly ReadView[]; names: readonly string[]; at: number; hit: Hit | null; sizeBytes: number; onFound(hit: Hit): void }) {
  const [as, setAs] = useState<"bytes" | "text">("bytes");
  const [where, setWhere] = useState("");
  const [wrong, setWrong] = useState<string | null>(null);
  const [said, setSaid] = useState("");
  const [running, setRunning] = useState<AbortController | null>(null);
  const field = useRef<HTMLInputElement>(null);

  const sides = reads.flatMap((_, side) => (where === "" || where === String(side) ? [side] : []));

  /** Why this can't be looked for; null where it can. */
  function problemOf(sought: string): string | null {
    if (as === "text") return sought === "" ? "Type the text to look for." : null;
    const pairs = hexPairs(sought);
    if (!pairs) return "Type bytes as pairs of hex digits, such as 5A A5, or choose text.";
    return pairs.length > MOST_SOUGHT ? `Look for at most ${MOST_SOUGHT} bytes.` : null;
  }

  async function find(way: Way) {
    const sought = field.current?.value ?? "";
    const problem = problemOf(sought);
    setSaid("");
    setWrong(problem);
    if (problem) return field.current?.focus();
    // what was found last stands at the address still: the search goes on behind it
    const from = way === "next" && hit?.at === at ? at + 1 : at;
    const query = new URLSearchParams({ [as]: sought, from: String(Math.min(from, sizeBytes)), way });
    const controller = new AbortController();
    setRunning(controller);
    try {
      const answers = await Promise.all(sides.map(async (side) => ({ side, found: (await fetcher<{ found: Found | null }>(`/api/reads/${reads[side].id}/find?${query}`, controller.signal)).found })));
      const place = nearest(answers.flatMap(({ side, found }) => (found ? [{ ...found, side }] : [])), way);
      if (!place) return setSaid(`${listText(sides.map((side) => names[side]))} ${sides.length === 1 ? "doesn’t" : "don’t"} hold it anywhere.`);
      onFound({ side: place.side, at: place.at, length: place.length });
      const others = answers.filter(({ side, found }) => side !== place.side && found?.at === place.at).map(({ side }) => names[side]);
      setSaid(`${listText([names[place.side], ...others])} ${others.length > 0 ? "hold" : "holds"} it at ${address(place.at, sizeBytes)}${WRITTEN[place.as]}.${place.around ? ` From the ${way === "next" ? "start" : "end"} again.` : ""}`);
    } catch (error) {
      if (!controller.signal.aborted) setWrong(error instanceof Refusal ? error.detail : "The search broke off. Try again.");
    } finally {
      setRunning(null);
    }
  }

  return (
    <form className="no-print flex flex-wrap items-center gap-x-2.5 gap-y-2" role="search" aria-label="Find in the bytes" onSubmit={(event) => { event.preventDefault(); void find("next"); }}>
      <label htmlFor="sought" className="text-t2">Find</label>
      <input ref={field} id="sought" maxLength={256} autoComplete="off" spellCheck={false} placeholder={as === "bytes" ? "5A A5" : ""} aria-invalid={wrong ? true : undefined} aria-describedby="sought-says" className={controlClass(Boolean(wrong), true, "!w-[180px] min-h-control")} />
      <Select quiet label="Written as" value={as} onChange={(event) => setAs(event.target.value as "bytes" | "text")} options={[{ value: "bytes", label: "as bytes" }, { value: "text", label: "as text" }]} />
      <Select quiet label="In which read" value={where} onChange={(event) => setWhere(event.target.value)} options={[{ value: "", label: "in any read" }, ...names.map((name, side) => ({ value: String(side), label: `in ${name}` }))]} />
      <Button onClick={() => void find("previous")}><Icon name="prev" />Find previous</Button>
      <Button type="submit">Find next<Icon name="next" /></Button>
      {running ? <span className="text-t2">Looking through {countOf(sides.length, "read")} of {sizeText(sizeBytes)}. <Button variant="text" onClick={() => running.abort()}>Stop</Button></span> : null}
      <span id="sought-says" role="status" className={`text-t2 ${wrong ? "font-medium text-block" : ""}`}>{wrong ?? said}</span>
    </form>
  );
}
