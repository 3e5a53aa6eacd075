"use client";

import { useEffect } from "react";
import { Button, Buttons } from "@/components/ui/button";
import { Note } from "@/components/ui/note";

/** The page could not be made. What is stored is safe: showing a page changes nothing. */
export default function PageError({ error, reset }: { error: Error & { digest?: string }; reset: () => void }) {
  useEffect(() => {
    // The server has logged the cause; this is for whoever looks at the browser's console.
    console.error(error);
  }, [error]);
  return (
    <main id="main" className="mx-auto grid max-w-[1120px] gap-5 px-8 py-10 phone:px-4">
      <h1 className="text-t7 font-bold tracking-[-0.012em]">This page can’t be shown just now.</h1>
      <Note kind="block" title="Nothing was changed." role="alert">
        Showing a page writes nothing. Try again; if it stays, tell whoever runs Twinread{error.digest ? <> and give them the number <code>{error.digest}</code></> : null}.
      </Note>
      <Buttons><Button variant="lead" onClick={reset}>Try again</Button></Buttons>
    </main>
  );
}
