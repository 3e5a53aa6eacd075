import { requestAnswers } from "@/lib/schemas/request";

/** Everything that can be typed, as the fields hold it: texts, and boxes that are ticked or not. */
const TEXTS = {
  name: "", company: "", email: "", phone: "", returnAddress: "", partNumber: "", serial: "", model: "", interface: "", capacity: "", made: "",
  boardNumber: "", boardRevision: "", enclosure: "", lock: "", damage: "", happened: "", tried: "", importance: "", neededBy: "", keepDays: "", signature: "",
};
const TICKS = { boardHidden: false, consentOwner: false, consentRead: false, consentWrite: false, consentSolder: false };
export type TextName = keyof typeof TEXTS;
export type TickName = keyof typeof TICKS;
export type FieldName = TextName | TickName;
export type Draft = Record<TextName, string> & Record<TickName, boolean>;
const EMPTY: Draft = { ...TEXTS, ...TICKS };

/** In the order of the form, with the words for "still open". */
export const FIELD_WORDS: Record<Exclude<FieldName, "keepDays">, string> = {
  name: "your name", company: "the company", email: "the e-mail address", phone: "the telephone number", returnAddress: "the return address",
  partNumber: "the part number", serial: "the serial number", model: "the model", interface: "the interface", capacity: "the capacity", made: "month and year made",
  boardNumber: "the board number", boardRevision: "the revision", boardHidden: "the line below the board number", enclosure: "the enclosure", lock: "the password",
  damage: "what happened", happened: "how it happened", tried: "what was tried", importance: "how much hangs on it", neededBy: "the day you need it by",
  consentOwner: "the first line of your leave", consentRead: "the second line of your leave", consentWrite: "the third line of your leave", consentSolder: "the fourth line of your leave", signature: "your signature",
};
export const FIELD_ORDER = Object.keys(FIELD_WORDS) as FieldName[];

export type Errors = Partial<Record<FieldName, string>>;

/** What doesn't fit yet, the first reason of each field. */
export function errorsIn(draft: Draft): Errors {
  const result = requestAnswers.safeParse(draft);
  return result.success ? {} : errorsOf(result.error.issues.map(({ path, message }) => ({ path: path.join("."), message })));
}

export function errorsOf(list: readonly { path: string; message: string }[]): Errors {
  const errors: Errors = {};
  for (const { path, message } of list) if (path in EMPTY) errors[path as FieldName] ??= message;
  return errors;
}

/** "the part number and the third line of your leave"; long lists are cut. */
export const openFields = (errors: Errors): FieldName[] => FIELD_ORDER.filter((name) => errors[name] !== undefined);

const KEY = "twinread-request";
let current: Draft | null = null;
const listeners = new Set<() => void>();

function kept(): Draft {
  try {
    const found = JSON.parse(sessionStorage.getItem(KEY) ?? "{}") as Record<string, unknown>;
    const draft: Record<string, string | boolean> = { ...EMPTY };
    for (const [name, otherwise] of Object.entries(EMPTY)) if (typeof found[name] === typeof otherwise) draft[name] = found[name] as string | boolean;
    return draft as Draft;
  } catch {
    // no storage, or not ours: the form is empty
    return EMPTY;
  }
}

/** What was typed stays in this tab: over a refusal, a reload, and a look at another page. */
export const draftStore = {
  subscribe(listener: () => void): () => void {
    listeners.add(listener);
    return () => listeners.delete(listener);
  },
  get: (): Draft => (current ??= kept()),
  atServer: (): Draft => EMPTY,
  set(change: Partial<Draft>): void {
    current = { ...draftStore.get(), ...change };
    try {
      sessionStorage.setItem(KEY, JSON.stringify(current));
    } catch {
      // a full or closed storage: the page itself still holds it
    }
    for (const listener of listeners) listener();
  },
  clear(): void {
    current = EMPTY;
    try {
      sessionStorage.removeItem(KEY);
    } catch {
      // nothing was kept then
    }
    for (const listener of listeners) listener();
  },
};

