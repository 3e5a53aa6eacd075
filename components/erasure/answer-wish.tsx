"use client";

import { useState } from "react";
import { Button } from "@/components/ui/button";
import { whenAsked } from "@/components/ui/when-asked";

const AnswerForm = whenAsked(() => import("./answer-form").then((m) => m.AnswerForm));

/** One of two answers to a customer's wish for deletion; the other is the erasure itself. */
export function AnswerWish({ requestId, email }: { requestId: string; email: string }) {
  const [open, setOpen] = useState(false);
  return (
    <>
      <Button onClick={() => setOpen(true)}>Answer why not yet…</Button>
      {open ? <AnswerForm requestId={requestId} email={email} onClose={() => setOpen(false)} /> : null}
    </>
  );
}
