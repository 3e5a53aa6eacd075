import { AUDIT_LISTS } from "@/lib/core/audit";
import { notFound } from "@/lib/commands/refuse";
import { handler } from "@/lib/http/handler";
import { othersThan } from "@/lib/http/others-than";
import { auditFile, auditPage } from "@/lib/queries/audit-files";
import { allowAudit } from "@/lib/queries/audit-rights";
import { CSV_TYPE } from "@/lib/queries/csv";
import { auditAsked, type AuditAsked } from "@/lib/schemas/audit";

export const GET = handler<AuditAsked>({ input: auditAsked }, async ({ actor, input: { format, ...input }, params }) => {
  allowAudit(actor);
  const list = AUDIT_LISTS.find((name) => name === params.list);
  if (!list) throw notFound("list");
  if (format === "json") return auditPage(actor, list, input);
  const { fileName, stream } = await auditFile(actor, list, input);
  return new Response(stream, { headers: { "content-type": CSV_TYPE, "content-disposition": `attachment; filename="${fileName}"` } });
});
export const { POST, PUT, PATCH, DELETE, OPTIONS } = othersThan("GET");
