"use client";

import { useEffect } from "react";
import { Refusal, send } from "@/lib/http/send";

/** Tells that a person opened the link (the server counts the first time only): programs that only fetch links run no script. */
export function SayOpened({ token }: { token: string }) {
  useEffect(() => {
    send("POST", "/api/shares/opened", { token }).catch((error: unknown) => {
      // the customer came to read; whether we learn of it is our concern
      if (!(error instanceof Refusal)) throw error;
    });
  }, [token]);
  return null;
}
