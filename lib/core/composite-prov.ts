/** What compositeReport wrote, as far as its provenance is told here. */
interface Report {
  method: string;
  version: number;
  sizeBytes: number;
  crc32: string;
  sha256: string;
  seatings: number;
  sources: Source[];
  excluded: (Source & { cause: string })[];
  counts: { firm: number; weak: number; constructed: number; disputed: number };
  limit: string;
}

interface Source {
  sha256: string;
  seating: number;
  number: number | null;
}

/** What the log knows and the report doesn't. Times in RFC 3339. */
export interface ProvenanceContext {
  /** SHA-256 of the report's own bytes */
  reportSha256?: string;
  madeAt?: string;
  /** who had the vote made; an id of the workshop's, and a name where it may be told */
  madeBy?: { id: string; name?: string };
  accepted?: { by: { id: string; name?: string }; at?: string; reason?: string };
}

type Value = string | number | { $: string; type: string };
type Attributes = Record<string, Value>;
type Records = Record<string, Attributes>;

/** A PROV-JSON document: kinds of records, each by its identifier. */
export interface ProvDocument {
  prefix: Record<string, string>;
  entity: Records;
  activity: Records;
  agent: Records;
  used: Records;
  wasGeneratedBy: Records;
  wasDerivedFrom: Records;
  wasAssociatedWith: Records;
  wasAttributedTo: Records;
}

/** A tag URI (RFC 4151) under a name that nobody can own, so that it never leads anywhere. */
const OWN = "tag:twinread.example,2026:";

const qualified = (name: string): Value => ({ $: name, type: "xsd:QName" });

/** Without what isn't known. */
function attributes(some: Record<string, Value | null | undefined>): Attributes {
  return Object.fromEntries(Object.entries(some).filter((entry): entry is [string, Value] => entry[1] !== null && entry[1] !== undefined));
}

function sourceEntity({ sha256, seating, number, cause }: Source & { cause?: string }): Attributes {
  return attributes({
    "prov:type": qualified("twinread:read"), "prov:label": number === null ? null : `Read ${number}`,
    "twinread:sha256": sha256, "twinread:seating": seating, "twinread:leftOutBecause": cause,
  });
}

/** Blank identifiers in order: _:used1, _:used2. */
const numbered = (name: string, records: readonly Attributes[]): Records => Object.fromEntries(records.map((record, i) => [`_:${name}${i + 1}`, record]));

const person = ({ id, name }: { id: string; name?: string }): Attributes => attributes({ "prov:type": qualified("prov:Person"), "prov:label": name, "twinread:id": id });

/**
 * The provenance of a composite as W3C PROV-JSON (Member Submission of 24 April 2013; its record kinds, attribute names
 * and the form of qualified names are from memory of the published note). `report` is what compositeReport wrote; the
 * list of disputed bytes stays there. The same report and context give the same document, byte for byte once canonical.
 */
export function provenance(report: string, { reportSha256, madeAt, madeBy, accepted }: ProvenanceContext = {}): ProvDocument {
  const { method, version, sizeBytes, crc32, sha256, seatings, sources, excluded, counts, limit } = JSON.parse(report) as Report;
  const [vote, composite, text, engine, acceptance] = ["vote", "composite", "report", "engine", "acceptance"].map((name) => `twinread:${name}`);
  const voters = sources.map((_, i) => `twinread:source-${i + 1}`);
  const leftOut = excluded.map((_, i) => `twinread:left-out-${i + 1}`);
  // one person may do both, and stays one agent, with the name that the maker's part gives
  const maker = madeBy && `twinread:person-${madeBy.id}`;
  const lead = accepted && `twinread:person-${accepted.by.id}`;
  return {
    prefix: { prov: "http://www.w3.org/ns/prov#", xsd: "http://www.w3.org/2001/XMLSchema#", twinread: OWN },
    entity: {
      ...Object.fromEntries(sources.map((source, i) => [voters[i], sourceEntity(source)])),
      ...Object.fromEntries(excluded.map((source, i) => [leftOut[i], sourceEntity(source)])),
      [composite]: attributes({
        "prov:type": qualified("twinread:composite"), "twinread:sha256": sha256, "twinread:crc32": crc32, "twinread:sizeBytes": sizeBytes, "twinread:seatings": seatings,
        "twinread:disputedBytes": counts.disputed, "twinread:weakBytes": counts.weak, "twinread:constructedBytes": counts.constructed, "twinread:limit": limit,
      }),
      [text]: attributes({ "prov:type": qualified("twinread:report"), "twinread:sha256": reportSha256 }),
    },
    activity: {
      [vote]: attributes({ "prov:type": qualified("twinread:vote"), "prov:endTime": madeAt, "twinread:method": method, "twinread:version": version }),
      ...(accepted ? { [acceptance]: attributes({ "prov:type": qualified("twinread:acceptance"), "prov:endTime": accepted.at, "twinread:reason": accepted.reason }) } : {}),
    },
    agent: {
      [engine]: attributes({ "prov:type": qualified("prov:SoftwareAgent"), "prov:label": "Twinread" }),
      ...(accepted && lead ? { [lead]: person(accepted.by) } : {}),
      ...(madeBy && maker ? { [maker]: person(madeBy) } : {}),
    },
    used: numbered("used", [
      ...voters.map((source) => ({ "prov:activity": vote, "prov:entity": source, "prov:role": qualified("twinread:voter") })),
      ...(accepted ? [{ "prov:activity": acceptance, "prov:entity": composite }] : []),
    ]),
    wasGeneratedBy: numbered("generated", [composite, text].map((made) => attributes({ "prov:entity": made, "prov:activity": vote, "prov:time": madeAt }))),
    wasDerivedFrom: numbered("derived", voters.map((source) => ({ "prov:generatedEntity": composite, "prov:usedEntity": source, "prov:activity": vote }))),
    wasAssociatedWith: numbered("associated", [
      { "prov:activity": vote, "prov:agent": engine },
      ...(maker ? [{ "prov:activity": vote, "prov:agent": maker }] : []),
      ...(lead ? [{ "prov:activity": acceptance, "prov:agent": lead }] : []),
    ]),
    wasAttributedTo: numbered("attributed", [{ "prov:entity": composite, "prov:agent": maker ?? engine }]),
  };
}
