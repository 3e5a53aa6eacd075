import Link from "next/link";
import { CHAIN_PROBLEMS } from "@/lib/core/chain-words";
import type { ChainProblem } from "@/lib/core/custody";
import { Commands, HelpTable, Part, Points, See, Steps, WidePart } from "./prose";

const PROBLEMS = Object.entries(CHAIN_PROBLEMS) as [ChainProblem, string][];

export function CustodyHelp() {
  return (
    <>
      <Part title="The log" first>
        <p>Every drive has a log. Each step is one entry: who, in what role, when, what was done, and every fact that is needed to believe it, digests included. An entry holds the digest of the one before, so no entry can be changed, taken out or put in between without a trace; and each is signed with the workshop’s log key. Nobody can edit an entry here, the admin neither. What was wrong is put right by a new entry.</p>
        <p>What belongs to no drive (accounts, policy, keys, seals, requests) stands in the log of the workshop. No log holds a customer’s name or e-mail.</p>
      </Part>
      <Part title="Hand-overs">
        <p>When a drive, board or chip goes from one person or place to another, write down from whom, to whom, where, in what condition and under which seal. The receiver confirms, or says that it did not arrive. The page of items shows who holds what now.</p>
      </Part>
      <Part title="Late notes">
        <p>A note about something that happened earlier carries its own time, and is marked late. A correction is a new note that names the one it corrects.</p>
      </Part>
      <Part title="Checking a log" id="check">
        <p>Press “Check the log” on the log’s page: every entry’s form, link and signature is worked out again, and the head is compared. The server does the same by itself once a day, and reads every stored image again once a week. When it finds nothing, then nothing was changed since it was written by anybody who does not hold both the workshop’s key and its database.</p>
      </Part>
      <Part title="When the check finds something" id="not-clean">
        <Steps>
          <li>Nothing is put right by itself, and nothing should be put right by hand: a repair would destroy the evidence.</li>
          <li>Approval, hand-out and transfer of this drive wait. Reads and notes can go on.</li>
          <li>An auditor looks at the entry, at seals and bundles from outside and at the backups, and records an assessment. It stands in the log; the finding stays visible.</li>
        </Steps>
      </Part>
      <WidePart title="What a check can find" id="problems">
        <HelpTable caption="What the check of a log can find" head={["Code", "What it says"]} rows={PROBLEMS.map(([code, sentence]) => ({ key: code, cells: [<code key="code">{code}</code>, sentence] }))} />
      </WidePart>
      <Part title="Seals" id="seals">
        <p>A chain can’t see that its own end was cut off. So every day, before each bundle and summary and whenever an auditor asks, a seal is made: a signed statement of where every log stands, each seal following the one before. It is mailed to the auditors and appended to a witness file that may lie on another disk. What has left the house can’t be taken back.</p>
        <p>Save the seal’s three files from the audit page, and check its signature with OpenSSL 3:</p>
        <Commands label="Check a seal">{"openssl pkeyutl -verify -pubin -inkey seal-key.pem \\\n  -rawin -in seal.txt -sigfile seal.sig"}</Commands>
        <p>Compare the key’s fingerprint with one that reached you in another way: it stands in every seal mail and on every summary.</p>
      </Part>
      <Part title="The bundle" id="bundle">
        <p>A case goes out as one ZIP file that follows BagIt (RFC 8493): every image, the logs with their signatures, photos, a report, the keys and a seal. Whoever gets it can check it without us:</p>
        <Commands label="Check a bundle">{"unzip twinread-26-0042.zip && cd twinread-26-0042\nsh check.sh KEY-FINGERPRINT"}</Commands>
        <Points>
          <li>It says what it checked, part by part, and ends with 0 when all is in order, 1 when something is not, 2 when it could not check.</li>
          <li>Without the fingerprint it says “keys not compared”: then the bundle is whole in itself, but you don’t know whose it is.</li>
          <li>The page <Link href="/verify" prefetch={false}>Check a case bundle</Link> does the same in the browser; nothing is sent.</li>
        </Points>
        <p>What even a clean check can’t show stands in <See topic="limits" at="log">what it does not prove</See>.</p>
      </Part>
    </>
  );
}
