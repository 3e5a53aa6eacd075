import { derivedFacts } from "@/lib/core/derived";
import { crc32Hex } from "@/lib/core/digest";
import type { Finding } from "@/lib/core/words";
import type { ErasedView, ReadView } from "@/lib/views";
import type { Read } from "@/models";
import type { People } from "./people";

export function readView(row: Read, who: People, imageSound = true, erased: ErasedView | null = null): ReadView {
  const derived = derivedFacts(row);
  return {
    id: row.id, chipId: row.chipId, number: row.number, stage: row.stage, seating: row.seating, sizeBytes: row.sizeBytes,
    crc32: crc32Hex(row.crc32), sha256: row.sha256.toString("hex"), counted: row.counted, findings: JSON.parse(row.findings) as Finding[],
    format: row.format, fileName: row.fileName, reader: row.reader, method: row.method ?? null, toolVersion: row.toolVersion ?? null,
    adapter: row.adapter ?? null, supplyMillivolts: row.supplyUnknown ? "unknown" : row.supplyMillivolts ?? null,
    clockKilohertz: row.clockKilohertz ?? null, controllerHeld: row.controllerHeld ?? null, note: row.note ?? null, operator: who(row.operatorId),
    takenAt: row.takenAt?.toISOString() ?? null, modifiedAt: row.modifiedAt?.toISOString() ?? null, storedAt: row.storedAt.toISOString(),
    transferId: row.transferId ?? null,
    setAside: row.counted ? null : { reason: row.setAsideReason ?? "", by: who(row.setAsideBy ?? null), at: (row.setAsideAt ?? row.storedAt).toISOString() },
    source: row.sourceSha256 ? { sha256: row.sourceSha256.toString("hex"), base: row.sourceBase ?? 0, fill: row.sourceFill ?? 0 } : null,
    derived: derived && {
      method: derived.method, voters: derived.voters.map((v) => v.number), excluded: derived.excluded.map((e) => e.number), disputedBytes: derived.disputedBytes,
      weak: derived.counts.weak, constructed: derived.counts.constructed, limit: derived.limit,
    },
    imageSound, erased,
  };
}
