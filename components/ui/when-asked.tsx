"use client";

import { type ComponentType, useEffect, useLayoutEffect, useRef, useState } from "react";
import { Button, Buttons } from "./button";

const NOTICED_MS = 300;
const dialogBox = () => import("./dialog-box");

/**
 * A dialog whose code comes when it is first asked for, so that no page carries it. Mount it only while it is open. While
 * it comes the focus stays where it was; a wait long enough to be noticed says so, and so does a dialog that can't be had.
 */
export function whenAsked<Given extends { onClose(): void }>(load: () => Promise<ComponentType<Given>>): ComponentType<Given> {
  const kept: { part: ComponentType<Given> | null } = { part: null };
  return function WhenAsked(given: Given) {
    const [Part, setPart] = useState(() => kept.part);
    const [step, setStep] = useState<"coming" | "slow" | "missing">("coming");
    useEffect(() => {
      if (Part || step === "missing") return;
      let here = true;
      const slow = setTimeout(() => setStep("slow"), NOTICED_MS);
      // what every dialog stands in comes along in the same breath
      Promise.all([load(), dialogBox()]).then(([found]) => {
        kept.part = found;
        if (here) setPart(() => found);
      }, () => {
        if (here) setStep("missing");
      }).finally(() => clearTimeout(slow));
      return () => {
        here = false;
        clearTimeout(slow);
      };
    }, [Part, step]);
    if (Part) return <Part {...given} />;
    return step === "coming" ? null : <Waiting missing={step === "missing"} onAgain={() => setStep("slow")} onClose={given.onClose} />;
  };
}

/** The browser's own dialog: it needs no code that would have to come first. */
function Waiting({ missing, onAgain, onClose }: { missing: boolean; onAgain(): void; onClose(): void }) {
  const box = useRef<HTMLDialogElement>(null);
  useLayoutEffect(() => {
    const dialog = box.current;
    dialog?.showModal();
    // closing gives the focus back to what opened it: there the dialog itself finds it
    return () => dialog?.close();
  }, []);
  return (
    <dialog ref={box} aria-label={missing ? "This can’t be opened now" : "Opening"} onCancel={(event) => { event.preventDefault(); onClose(); }}
      className="m-auto w-[min(560px,calc(100vw-24px))] border border-rule-2 border-t-4 border-t-mask bg-paper px-6 pt-5 pb-6 text-t3 text-ink backdrop:bg-[color-mix(in_srgb,var(--mask-deep)_62%,transparent)] phone:px-4">
      <div className="grid gap-4">
        {missing ? (
          <div role="alert">
            <b className="text-t4">This can’t be opened now.</b>
            <p>Twinread can’t be reached, or it was updated after this page was loaded. Check the network and try again. If that doesn’t help, reload the page.</p>
          </div>
        ) : <p role="status">Fetching what is to be opened.</p>}
        <Buttons>
          {missing ? <Button variant="lead" onClick={onAgain}>Try again</Button> : null}
          <Button onClick={onClose}>Leave it</Button>
        </Buttons>
      </div>
    </dialog>
  );
}
