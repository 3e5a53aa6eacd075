import { type FieldErrors, type FieldValues, type Resolver, set } from "react-hook-form";
import type { z } from "zod";

const AWAY = "What you typed can’t be checked, because Twinread can’t be reached. Check the network, then try again.";

/** The rules of a form that stands on a page: fetched when something is first held against them, so that the page doesn't carry them. */
export function rulesFrom<Typed extends FieldValues, Taken extends FieldValues>(load: () => Promise<z.ZodType<Taken, Typed>>): Resolver<Typed, unknown, Taken> {
  return async (values, context, options) => {
    const come = await Promise.all([import("@hookform/resolvers/zod"), load()]).catch(() => null);
    if (come) return come[0].zodResolver(come[1])(values, context, options);
    const errors: FieldErrors<Typed> = {};
    set(errors, options.names?.[0] ?? Object.keys(values)[0], { type: "away", message: AWAY });
    return { values: {}, errors };
  };
}
