/**
 * The commands of the page on the interface. tests/e2e/help-api.spec.ts runs each of them, word by word, against a
 * running Twinread: what stands in capitals after a $ is a variable of the shell.
 */
export interface ApiExample {
  key: string;
  title: string;
  about: string;
  command: string;
  /** HTTP status of the answer */
  status: number;
  /** a piece of the answer that shows what it looks like, and that the test finds in it */
  answer: string;
  /** the answer's `id` goes on under this name */
  gives?: string;
}

const AUTH = '-H "Authorization: Bearer $TOKEN"';
const LEAD = '-H "Authorization: Bearer $LEAD_TOKEN"';

export const API_EXAMPLES: readonly ApiExample[] = [
  {
    key: "health", title: "Is it there", about: "Needs no sign-in.",
    command: "curl $TWINREAD/api/health",
    status: 200, answer: '"status":"ok"',
  },
  {
    key: "case", title: "Record a case", gives: "CASE", about: "Keep the id of the answer. The Idempotency-Key is yours to choose: the same request under the same key is done once.",
    command: `curl ${AUTH} -H "Idempotency-Key: case-$JOB" \\
  --json @- $TWINREAD/api/cases <<'END'
{"customer": {"name": "Example customer", "email": "customer@workshop.example"},
 "damage": "Power surge"}
END`,
    status: 201, answer: '"ref":"',
  },
  {
    key: "drive", title: "Record a drive", gives: "DRIVE", about: "One of part number, model and serial is enough.",
    command: `curl ${AUTH} --json '{"partNumber": "PN 4471-0093-B"}' \\
  $TWINREAD/api/cases/$CASE/drives`,
    status: 201, answer: '"id":"',
  },
  {
    key: "board", title: "Record the original board", gives: "BOARD", about: "The donor board goes the same way, with the role donor.",
    command: `curl ${AUTH} \\
  --json '{"role": "original", "boardNumber": "BX 40-3179", "revision": "rev C"}' \\
  $TWINREAD/api/drives/$DRIVE/boards`,
    status: 201, answer: '"id":"',
  },
  {
    key: "chip", title: "Record its chip", gives: "CHIP", about: "The supply is asked for: say “unknown” when it is.",
    command: `curl ${AUTH} --json @- $TWINREAD/api/boards/$BOARD/chips <<'END'
{"designator": "U12", "bus": "spi", "sizeBytes": 65536, "sizeSource": "marking",
 "supplyMillivolts": 3300}
END`,
    status: 201, answer: '"id":"',
  },
  {
    key: "donor-board", title: "Record the donor board", gives: "DONOR_BOARD", about: "An equal board number fits; another one needs a lead’s reason.",
    command: `curl ${AUTH} \\
  --json '{"role": "donor", "boardNumber": "BX 40-3179", "revision": "rev C"}' \\
  $TWINREAD/api/drives/$DRIVE/boards`,
    status: 201, answer: '"id":"',
  },
  {
    key: "donor-chip", title: "Record the donor’s chip, and pair it", gives: "DONOR", about: "pairedWith names the original’s chip whose content it is to take.",
    command: `curl ${AUTH} --json @- $TWINREAD/api/boards/$DONOR_BOARD/chips <<END
{"designator": "U12", "bus": "spi", "sizeBytes": 65536, "sizeSource": "marking",
 "supplyMillivolts": 3300, "pairedWith": "$CHIP"}
END`,
    status: 201, answer: '"id":"',
  },
  {
    key: "donor-reads", title: "Save the donor’s own content", about: "Several files of one seating go in one call. All of them are stored, or none.",
    command: `curl ${AUTH} -F stage=donor -F seating=1 -F reader=R2 \\
  -F file=@own-1.bin -F file=@own-2.bin \\
  $TWINREAD/api/chips/$DONOR/reads`,
    status: 201, answer: '"stage":"donor"',
  },
  {
    key: "reads", title: "Upload reads of the original", about: "sha256, one for each file and in their order, is what the server must come to; otherwise nothing is stored.",
    command: `curl ${AUTH} -H "Idempotency-Key: seating-1-$CHIP" \\
  -F stage=before -F seating=1 -F reader=R2 -F supplyMillivolts=3300 \\
  -F sha256=$(sha256sum read-1.bin | cut -c1-64) -F file=@read-1.bin \\
  -F sha256=$(sha256sum read-2.bin | cut -c1-64) -F file=@read-2.bin \\
  $TWINREAD/api/chips/$CHIP/reads`,
    status: 201, answer: '"state":"needs-reads"',
  },
  {
    key: "wrong-digest", title: "An upload that arrives damaged", about: "Every error has this shape (RFC 9457). detail says what stands against it and what to do.",
    command: `curl ${AUTH} -F stage=before -F seating=2 -F reader=R2 \\
  -F sha256=$(sha256sum own-1.bin | cut -c1-64) -F file=@read-3.bin \\
  $TWINREAD/api/chips/$CHIP/reads`,
    status: 422, answer: '"title":"The input does not fit","status":422,"detail":"',
  },
  {
    key: "next-seating", title: "The next seating", about: "The clip was taken off and put on again.",
    command: `curl ${AUTH} -F stage=before -F seating=2 -F reader=R2 -F file=@read-3.bin \\
  $TWINREAD/api/chips/$CHIP/reads`,
    status: 201, answer: '"state":"ready"',
  },
  {
    key: "view", title: "See a chip", about: "State, sentence, reads with their findings, groups of equal reads, pair, approvals, transfers.",
    command: `curl ${AUTH} $TWINREAD/api/chips/$CHIP`,
    status: 200, answer: '"label":"Waiting for approval"',
  },
  {
    key: "comparison", title: "Compare two reads", about: "By their numbers. stage=donor or stage=after for other kinds of read.",
    command: `curl ${AUTH} \\
  "$TWINREAD/api/chips/$CHIP/comparison?reads=1,3"`,
    status: 200, answer: '"equal":true,"differingBytes":0',
  },
  {
    key: "no-leave", title: "A download that is refused", about: "READ is the id of a read. A technician gets the approved image and a donor’s own content; a lead or auditor any image, with a reason: {\"reason\": \"…\"}.",
    command: `curl ${AUTH} --json '{}' \\
  $TWINREAD/api/reads/$READ/download`,
    status: 403, answer: '"title":"Your role may not do this","status":403,"detail":"',
  },
  {
    key: "ask", title: "Ask for approval", gives: "ASKED", about: "A technician asks; a lead gives it.",
    command: `curl ${AUTH} \\
  --json '{"message": "Three equal reads in two seatings."}' \\
  $TWINREAD/api/chips/$CHIP/approval-request`,
    status: 201, answer: '"id":"',
  },
  {
    key: "approval", title: "Approve", gives: "APPROVAL", about: "By a lead who took no read of the chip. The page is the better place for it: it shows what speaks for and against.",
    command: `curl ${LEAD} --json @- $TWINREAD/api/chips/$CHIP/approval <<END
{"sha256": "$(sha256sum read-1.bin | cut -c1-64)", "donorChipId": "$DONOR",
 "statement": "Three equal reads in two seatings."}
END`,
    status: 201, answer: '"sha256":"',
  },
  {
    key: "download", title: "Download the approved image", about: "READ is a read that holds it. The digest stands in Repr-Digest (RFC 9530), too; the hand-out is written down before the first byte leaves.",
    command: `curl ${AUTH} --json '{}' -D - -o approved.bin \\
  $TWINREAD/api/reads/$READ/download && sha256sum approved.bin`,
    status: 200, answer: "repr-digest: sha-256=:",
  },
  {
    key: "transfer", title: "Record the write", gives: "TRANSFER", about: "After it was done. kind is write or chip-moved.",
    command: `curl ${AUTH} --json @- $TWINREAD/api/approvals/$APPROVAL/transfer <<END
{"kind": "write", "donorChipId": "$DONOR", "programmer": "R2"}
END`,
    status: 201, answer: '"donorChipId":"',
  },
  {
    key: "read-back", title: "Upload read-backs", about: "To the donor’s chip. A second seating belongs in a call of its own.",
    command: `curl ${AUTH} -F stage=after -F seating=1 -F reader=R2 -F file=@back-1.bin \\
  $TWINREAD/api/chips/$DONOR/reads`,
    status: 201, answer: '"code":"verified"',
  },
  {
    key: "find", title: "Where is this image known", about: "By digest: eight or more hex digits of a SHA-256, or a CRC-32. Nothing is stored by asking.",
    command: `curl ${AUTH} \\
  "$TWINREAD/api/find?digest=$(sha256sum read-1.bin | cut -c1-64)"`,
    status: 200, answer: '"designator":"U12"',
  },
  {
    key: "custody", title: "Check a drive’s log", about: "Entries, with body, hash and signature, come from the same address without /check.",
    command: `curl ${AUTH} $TWINREAD/api/drives/$DRIVE/custody/check`,
    status: 200, answer: '"ok":true',
  },
  {
    key: "audit", title: "An audit list", about: "For auditors, leads and admins: drives, images, hand-outs, refusals, assessments, clock, seals, sessions, tokens, limits. format=csv gives all of it as a file.",
    command: `curl ${LEAD} "$TWINREAD/api/audit/hand-outs?format=csv"`,
    status: 200, answer: "U12",
  },
  {
    key: "seal", title: "Make a seal", about: "For auditors, leads and admins.",
    command: `curl ${LEAD} -X POST $TWINREAD/api/seals`,
    status: 201, answer: '"text":"twinread-seal/1\\n',
  },
  {
    key: "seal-text", title: "Save a seal’s text", about: "SEAL is its number. file=signature and file=key give the other two files that OpenSSL needs.",
    command: `curl ${LEAD} "$TWINREAD/api/seals/$SEAL?file=text"`,
    status: 200, answer: "twinread-seal/1\n",
  },
  {
    key: "bundle", title: "Save the bundle of a case", about: "For leads and auditors. It is made while it flows.",
    command: `curl ${LEAD} -X POST -o bundle.zip \\
  $TWINREAD/api/cases/$CASE/bundle && unzip -tq bundle.zip`,
    status: 200, answer: "No errors detected",
  },
  {
    key: "no-token", title: "Without a token", about: "With an Authorization header cookies are ignored; without one nothing else signs a script in.",
    command: "curl $TWINREAD/api/cases",
    status: 401, answer: '"title":"Not signed in","status":401',
  },
];
