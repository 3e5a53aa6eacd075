import type { Metadata } from "next";
import { notFound } from "next/navigation";
import { ImportShelf } from "@/components/shelf/import-shelf";
import { DeskShell } from "@/components/shell/desk-shell";
import { PageMain } from "@/components/shell/page-main";
import { Crumbs } from "@/components/ui/crumbs";
import { PageTitle, Section } from "@/components/ui/section";
import { signedIn } from "@/lib/auth/page";
import { may } from "@/lib/core/policy";

export const metadata: Metadata = { title: "Import boards" };

const COLUMNS = ["number", "board number", "revision", "controller marking", "motor driver marking", "chips", "origin", "condition", "place", "note", "reserved for"];

export default async function ImportPage() {
  const { actor, session } = await signedIn();
  if (!may(actor, "shelf.change")) notFound();
  return (
    <DeskShell session={session} current="shelf">
      <PageMain>
        <Crumbs items={[{ label: "Donor shelf", href: "/shelf" }, { label: "Import a list" }]} />
        <PageTitle note="First you see what each line would do. Then all lines are taken, or none.">Import boards from a list</PageTitle>
        <Section title="The list" note="CSV in UTF-8 with commas, semicolons or tabs; the first line names the columns. At most 10,000 rows, of which up to 1,000 add or change a board."><ImportShelf /></Section>
        <Section title="Its columns" note="Those that a file lacks stay as they are.">
          <div className="grid max-w-[76ch] gap-2">
            <p>{COLUMNS.map((name, i) => <span key={name}>{i > 0 ? ", " : ""}<span className="font-mono text-t2">{name}</span></span>)}. Only <span className="font-mono text-t2">board number</span> has to be there.</p>
            <p>A line with a number such as <span className="font-mono text-t2">D-0012</span> changes that board; one without a number adds a board, which gets the next one.</p>
            <p>Chips stand in one cell: <span className="font-mono text-t2">U3,spi,524288,SOIC-8,A7 0442 K;U12,i2c,8192</span> is designator, bus, size in bytes, package and marking, with a semicolon between two chips.</p>
            <p>The list that <a href="/api/shelf-boards?format=csv" download>the shelf saves as CSV</a> has all of them and changes nothing when it is brought back as it is.</p>
          </div>
        </Section>
      </PageMain>
    </DeskShell>
  );
}
