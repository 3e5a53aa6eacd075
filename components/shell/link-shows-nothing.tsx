import { PublicShell } from "./public-shell";

/** The same page for a link that never was, is past its date or was withdrawn: it tells nothing more. */
export function LinkShowsNothing({ workshop, demo, ask }: { workshop: string; demo: boolean; /** whom to ask: an address or a number, or "the workshop" */ ask: string }) {
  return (
    <PublicShell workshop={workshop} demo={demo}>
      <main id="main" className="mx-auto grid max-w-[1120px] gap-3 px-8 py-10 phone:px-4">
        <h1 className="text-t7 font-bold tracking-[-0.012em] phone:text-[1.625rem] phone:leading-8">This link shows nothing.</h1>
        <p className="max-w-[62ch] text-t4">It may be cut short, past its date, or withdrawn. Open it from the e-mail once more; if it still shows nothing, ask {ask} for a new one.</p>
      </main>
    </PublicShell>
  );
}
