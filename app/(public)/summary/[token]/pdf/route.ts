import { makeSummary } from "@/lib/report/make-summary";
import { env } from "@/lib/env";
import { AppError } from "@/lib/errors";
import { handler } from "@/lib/http/handler";
import { othersThan } from "@/lib/http/others-than";
import { summaryByToken } from "@/lib/queries/summary";

export const GET = handler({ open: "anyone" }, async ({ params: { token } }) => {
  const summary = /^[A-Za-z0-9_-]{43}$/.test(token) ? await summaryByToken(token) : null;
  if (!summary) throw new AppError("not-found", "There is no summary under this link. It may have ended or been withdrawn; ask the workshop for a new one.");
  const { publicUrl, timeZone } = env();
  const pdf = await makeSummary(summary, `${publicUrl}/summary/${token}`, timeZone);
  return new Response(new Uint8Array(pdf), { headers: {
    "content-type": "application/pdf", "content-disposition": `attachment; filename="summary-${summary.caseRef}.pdf"`, "content-length": String(pdf.length),
    // the address itself is the key
    "cache-control": "private, no-store", "x-content-type-options": "nosniff", "x-robots-tag": "noindex, nofollow", "referrer-policy": "no-referrer",
  } });
});
export const { POST, PUT, PATCH, DELETE, OPTIONS } = othersThan("GET");
