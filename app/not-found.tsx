import { Logo } from "@/components/ui/logo";
import { ButtonLink, Buttons } from "@/components/ui/button";
import { Empty } from "@/components/ui/empty";

export const metadata = { title: "Not found" };

export default function NotFound() {
  return (
    <>
      <header className="board"><div className="mx-auto flex max-w-[1120px] items-center gap-[11px] px-8 py-4 text-[1.1875rem] font-bold phone:px-4"><Logo />Twinread</div></header>
      <main id="main" className="mx-auto grid max-w-[1120px] gap-5 px-8 py-10 phone:px-4">
        <h1 className="text-t7 font-bold tracking-[-0.012em]">Nothing is kept at this address.</h1>
        <Empty title="Check the address, or look for it.">A link may be cut short, withdrawn or past its date, or the case is not one of yours.</Empty>
        <Buttons><ButtonLink variant="lead" href="/bench">Go to the bench</ButtonLink><ButtonLink href="/find">Find a case or a digest</ButtonLink><ButtonLink href="/help">Read the help</ButtonLink></Buttons>
      </main>
    </>
  );
}
