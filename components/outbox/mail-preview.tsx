"use client";

import { useState } from "react";

/** A mail's text, and the HTML that goes beside it: in a frame of its own where nothing runs and nothing is loaded. */
export function MailPreview({ subject, text, html }: { subject: string; text: string; html: string }) {
  const [shown, setShown] = useState<"text" | "html">("text");
  return (
    <div className="grid gap-2">
      <div className="seg justify-self-start" role="group" aria-label="How it is shown">
        <button type="button" aria-pressed={shown === "text"} onClick={() => setShown("text")}>Plain text</button>
        <button type="button" aria-pressed={shown === "html"} onClick={() => setShown("html")}>As mail programs show it</button>
      </div>
      {shown === "text"
        ? <pre className="max-w-[92ch] bg-sheet px-4 py-3 font-mono text-t2 whitespace-pre-wrap [overflow-wrap:anywhere]">{text}</pre>
        : <iframe title={`${subject}, as mail programs show it`} sandbox="" srcDoc={html} className="h-[560px] w-full max-w-[760px] border border-rule-2 bg-white" />}
    </div>
  );
}
