"use client";

import { zodResolver } from "@hookform/resolvers/zod";
import { useRef, useState } from "react";
import { type FieldValues, type Resolver, useForm, useWatch, type DefaultValues, type Path, type PathValue } from "react-hook-form";
import type { z } from "zod";
import { Refusal } from "@/lib/http/send";
import type { CaseChoice } from "./case-picker";

interface AccountFields extends FieldValues {
  role: string;
  cases?: string[] | null;
  endsOn?: unknown;
}

/** The form of an account: another role than auditor carries neither case list nor last day, whatever was typed before. */
export function useAccountForm<I extends AccountFields, O>(schema: z.ZodType<O, I>, defaultValues: I, chosen: CaseChoice[] | null) {
  const ofRole = (values: I): I => (values.role === "auditor" ? values : { ...values, cases: null, endsOn: null });
  const resolver: Resolver<I, unknown, O> = (values, context, options) => zodResolver<I, unknown, O>(schema)(ofRole(values), context, options);
  const form = useForm<I, unknown, O>({ resolver, defaultValues: defaultValues as DefaultValues<I> });
  const role = useWatch({ control: form.control, name: "role" as Path<I> }) as string;
  const [cases, setCases] = useState(chosen);
  const [refusal, setRefusal] = useState<string | null>(null);
  const listOpen = useRef(false);

  function changeCases(next: CaseChoice[] | null) {
    setCases(next);
    const value = (next && next.map((one) => one.id)) as PathValue<I, Path<I>>;
    form.setValue("cases" as Path<I>, value, { shouldDirty: true, shouldValidate: form.formState.isSubmitted });
  }
  /** Keeps the server's sentence, at its field where it names one of these. */
  function refuse(error: unknown) {
    if (!(error instanceof Refusal)) throw error;
    const fields = (error.problem.errors ?? []).filter((one) => one.path === "endsOn" || one.path === "cases");
    for (const { path, message } of fields) form.setError(path as Path<I>, { message });
    setRefusal(fields.length > 0 ? null : error.detail);
  }
  function reset() {
    setRefusal(null);
    setCases(chosen);
    form.reset();
  }
  const errorOf = (name: string) => form.formState.errors[name]?.message as string | undefined;
  return {
    ...form, role, cases, changeCases, refusal, setRefusal, refuse, reset, errorOf,
    /** Escape closes the list of hits first */
    onOpen: (open: boolean) => { listOpen.current = open; }, isListOpen: () => listOpen.current,
  };
}
