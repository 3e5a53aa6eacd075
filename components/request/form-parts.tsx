"use client";

import type { ReactNode } from "react";
import { Checkbox } from "@/components/ui/checkbox";
import { Input } from "@/components/ui/input";
import { Mark } from "@/components/ui/mark";
import { TextArea } from "@/components/ui/text-area";
import { lookAlikeHint } from "@/lib/core/look-alikes";
import { type Draft, draftStore, type Errors, type TextName, type TickName } from "./draft";

/** What every part of the form works on. */
export interface FormState {
  draft: Draft;
  errors: Errors;
}

export const fieldId = (name: string) => `rq-${name}`;

/** One numbered part of the form. */
export function Part({ number, title, children }: { number: number; title: string; children: ReactNode }) {
  return <fieldset className="rq-part"><legend><i>{number}</i>{title}</legend>{children}</fieldset>;
}

interface Words {
  label: ReactNode;
  hint?: ReactNode;
  wayOut?: ReactNode;
  /** the part of a label that says when it may be left out */
  aside?: string;
  /** where it stands in the drawing */
  place?: string;
  className?: string;
}

function Label({ label, aside, place }: Words) {
  return <>{place ? <span className="rq-place">{place}</span> : null}{label}{aside ? <span className="font-normal text-ink-2"> {aside}</span> : null}</>;
}

/** One line. `number`: copied from a label, so look-alikes are pointed out. */
export function Line({ form, name, number, type, autoComplete, max, ...words }: Words & { form: FormState; name: TextName; number?: boolean; type?: string; autoComplete?: string; max?: number }) {
  const value = form.draft[name];
  return (
    <Input
      id={fieldId(name)} name={name} type={type ?? "text"} value={value} onChange={(event) => draftStore.set({ [name]: event.target.value })}
      label={<Label {...words} />} hint={(number ? lookAlikeHint(value) : null) ?? words.hint} error={form.errors[name]} wayOut={words.wayOut} className={words.className}
      mono={number} autoComplete={autoComplete ?? "off"} autoCapitalize={number ? "characters" : undefined} spellCheck={number || type === "email" ? false : undefined} maxLength={max}
    />
  );
}

export function Lines({ form, name, rows = 2, autoComplete, max, ...words }: Words & { form: FormState; name: TextName; rows?: number; autoComplete?: string; max?: number }) {
  return (
    <TextArea
      id={fieldId(name)} name={name} rows={rows} value={form.draft[name]} onChange={(event) => draftStore.set({ [name]: event.target.value })} label={<Label {...words} />} hint={words.hint}
      error={form.errors[name]} className={words.className} autoComplete={autoComplete ?? "off"} maxLength={max}
    />
  );
}

export function Tick({ form, name, label }: { form: FormState; name: TickName; label: ReactNode }) {
  // the ticked line and the days that it names belong together
  const days = name === "consentRead" ? { keepDays: form.draft.keepDays } : {};
  return <Checkbox id={fieldId(name)} name={name} label={label} error={form.errors[name]} checked={form.draft[name]} onChange={(event) => draftStore.set({ ...days, [name]: event.target.checked })} />;
}

/** One of several; the first carries the id that the list of open fields leads to. */
export function Choice<T extends string>({ form, name, of, words, title, columns }: { form: FormState; name: TextName; of: readonly T[]; words: Record<T, string>; title?: ReactNode; columns?: boolean }) {
  const error = form.errors[name];
  const below = error ? `${fieldId(name)}-below` : undefined;
  return (
    <div role="radiogroup" aria-labelledby={title ? `${fieldId(name)}-title` : undefined} aria-label={title ? undefined : "What happened"} aria-describedby={below} aria-invalid={error ? true : undefined} className="grid content-start gap-2">
      {title ? <span id={`${fieldId(name)}-title`} className="text-t2 leading-5 font-semibold">{title}</span> : null}
      <div className={columns ? "rq-grid !gap-y-2" : "grid gap-2"}>
        {of.map((value, i) => <Checkbox key={value} type="radio" id={i === 0 ? fieldId(name) : undefined} name={name} value={value} label={words[value]} checked={form.draft[name] === value} onChange={() => draftStore.set({ [name]: value })} />)}
      </div>
      {error ? <span id={below} role="alert" className="flex gap-[7px] text-t2 font-medium text-block"><Mark kind="block" className="mt-px" /><span>{error}</span></span> : null}
    </div>
  );
}
