import { describe, expect, it } from "vitest";
import { canonicalJson } from "@/lib/core/canonical";
import { compositeReport, type CompositeSource, makeComposite } from "@/lib/core/composite";
import { type ProvDocument, provenance } from "@/lib/core/composite-prov";
import { sha256Hex, stream } from "./stream";

const GOOD = stream("bench-seed-1", 4096);
function source(number: number, seating: number, at: number, excluded?: string): CompositeSource {
  const bytes = GOOD.slice();
  bytes[at] ^= 1;
  return { bytes, sha256: sha256Hex(bytes), seating, number, excluded };
}
const SOURCES = [source(1, 1, 10), source(2, 1, 20), source(3, 2, 30), source(4, 2, 40, "it is shifted by bits (bit-slip)")];
const reportOf = (sources: CompositeSource[]) => compositeReport(makeComposite(sources), sha256Hex(GOOD));
const REPORT = reportOf(SOURCES);
const CONTEXT = {
  reportSha256: sha256Hex(REPORT), madeAt: "2026-03-12T13:48:00Z", madeBy: { id: "7", name: "Mira" },
  accepted: { by: { id: "9" }, at: "2026-03-12T14:00:00Z", reason: "Both weak bytes lie in padding." },
};

/** Which attributes of the record kinds name what (from memory of the published note, section 3). */
const NAMES: Record<string, [attribute: string, kind: keyof ProvDocument][]> = {
  used: [["prov:activity", "activity"], ["prov:entity", "entity"]],
  wasGeneratedBy: [["prov:entity", "entity"], ["prov:activity", "activity"]],
  wasDerivedFrom: [["prov:generatedEntity", "entity"], ["prov:usedEntity", "entity"], ["prov:activity", "activity"]],
  wasAssociatedWith: [["prov:activity", "activity"], ["prov:agent", "agent"]],
  wasAttributedTo: [["prov:entity", "entity"], ["prov:agent", "agent"]],
};

describe("a composite's provenance as PROV-JSON", () => {
  it.each([["with all that the log knows", CONTEXT], ["of the report alone", {}]])("%s names only what it holds, under prefixes that it declares", (_name, context) => {
    const document = provenance(REPORT, context);
    // kinds of records and their form from memory of the published note, sections 2 and 3
    expect(Object.keys(document).sort()).toEqual(["prefix", "entity", "activity", "agent", ...Object.keys(NAMES)].sort());
    expect(document.prefix).toMatchObject({ prov: "http://www.w3.org/ns/prov#", xsd: "http://www.w3.org/2001/XMLSchema#" });
    for (const [kind, attributes] of Object.entries(NAMES)) {
      for (const record of Object.values(document[kind as keyof ProvDocument] as ProvDocument["used"])) {
        for (const [attribute, named] of attributes) expect(Object.keys(document[named]), `${kind} ${attribute}`).toContain(record[attribute]);
      }
    }
    for (const records of Object.values(document).slice(1) as ProvDocument["used"][]) {
      for (const [id, record] of Object.entries(records)) {
        expect(id).toMatch(/^(_|twinread):[a-z0-9-]+$/);
        for (const [attribute, value] of Object.entries(record)) {
          expect(Object.keys(document.prefix)).toContain(attribute.split(":")[0]);
          if (typeof value === "object") expect(value).toEqual({ $: expect.stringMatching(/^(prov|twinread):[a-zA-Z-]+$/) as string, type: "xsd:QName" });
        }
      }
    }
  });
  it("derives the composite from each voter, and from no read that was left out", () => {
    const { entity, used, wasDerivedFrom } = provenance(REPORT, CONTEXT);
    const digests = (names: unknown[]) => names.map((name) => entity[name as string]["twinread:sha256"]).sort();
    const voters = SOURCES.slice(0, 3).map((one) => one.sha256).sort();
    expect(digests(Object.values(wasDerivedFrom).map((one) => one["prov:usedEntity"]))).toEqual(voters);
    expect(digests(Object.values(used).filter((one) => one["prov:activity"] === "twinread:vote").map((one) => one["prov:entity"]))).toEqual(voters);
    expect(entity["twinread:left-out-1"]).toMatchObject({ "prov:label": "Read 4", "twinread:sha256": SOURCES[3].sha256, "twinread:leftOutBecause": "it is shifted by bits (bit-slip)" });
    expect(entity["twinread:composite"]).toMatchObject({ "twinread:sha256": sha256Hex(GOOD), "twinread:sizeBytes": 4096, "twinread:disputedBytes": 3, "twinread:weakBytes": 3, "twinread:constructedBytes": 0 });
    expect(entity["twinread:report"]).toMatchObject({ "twinread:sha256": sha256Hex(REPORT) });
  });
  it("says who had it made and who accepted it, as one agent where that is one person", () => {
    const { agent, activity, wasAssociatedWith, wasAttributedTo } = provenance(REPORT, CONTEXT);
    expect(agent["twinread:person-7"]).toEqual({ "prov:type": { $: "prov:Person", type: "xsd:QName" }, "prov:label": "Mira", "twinread:id": "7" });
    expect(agent["twinread:person-9"]).not.toHaveProperty("prov:label");
    expect(activity["twinread:acceptance"]).toMatchObject({ "prov:endTime": "2026-03-12T14:00:00Z", "twinread:reason": "Both weak bytes lie in padding." });
    expect(Object.values(wasAssociatedWith).map((one) => `${String(one["prov:activity"])} ${String(one["prov:agent"])}`))
      .toEqual(["twinread:vote twinread:engine", "twinread:vote twinread:person-7", "twinread:acceptance twinread:person-9"]);
    expect(Object.values(wasAttributedTo)).toEqual([{ "prov:entity": "twinread:composite", "prov:agent": "twinread:person-7" }]);
    expect(Object.keys(provenance(REPORT, { ...CONTEXT, accepted: { by: { id: "7" } } }).agent)).toEqual(["twinread:engine", "twinread:person-7"]);
    expect(provenance(REPORT, { ...CONTEXT, accepted: { by: { id: "7" } } }).agent["twinread:person-7"]).toHaveProperty("prov:label", "Mira");
  });
  it("is the same whatever the order of the sources, and canonical JSON can hold it", () => {
    const texts = [SOURCES, [...SOURCES].reverse(), [SOURCES[2], SOURCES[0], SOURCES[3], SOURCES[1]]].map((sources) => canonicalJson(provenance(reportOf(sources), CONTEXT)));
    expect(new Set(texts).size).toBe(1);
  });
  it("holds two equal reads apart", () => {
    const twice = reportOf([source(1, 1, 10), source(2, 2, 10), source(3, 2, 30), source(5, 3, 50), source(6, 3, 60)]);
    expect(Object.keys(provenance(twice).entity).filter((id) => id.startsWith("twinread:source-"))).toHaveLength(5);
  });
});
