/**
 * What the app's database user may do, table by table: MariaDB cannot take one table out of a grant on the whole
 * database, so nothing is granted on the whole. The log can be read and appended to, nothing more.
 */
export const GRANTS: { table: string; grants: string[] }[] = [
  { table: "custody_entries", grants: ["SELECT", "INSERT"] },
  { table: "custody_heads", grants: ["SELECT", "INSERT", "UPDATE"] },
  { table: "seals", grants: ["SELECT", "INSERT"] },
  { table: "chain_checks", grants: ["SELECT", "INSERT", "UPDATE"] },
  { table: "user_cases", grants: ["SELECT", "INSERT", "DELETE"] },
  { table: "hand_overs", grants: ["SELECT", "INSERT", "UPDATE (received, confirmed_by, confirmed_at, confirmation)"] },
  { table: "users", grants: ["SELECT", "INSERT", "UPDATE"] },
  { table: "sessions", grants: ["SELECT", "INSERT", "UPDATE", "DELETE"] },
  { table: "sign_in_attempts", grants: ["SELECT", "INSERT", "DELETE"] },
  { table: "bench_tokens", grants: ["SELECT", "INSERT", "UPDATE"] },
  { table: "policies", grants: ["SELECT", "UPDATE"] },
  { table: "customers", grants: ["SELECT", "INSERT", "UPDATE"] },
  { table: "case_counters", grants: ["SELECT", "INSERT", "UPDATE"] },
  { table: "cases", grants: ["SELECT", "INSERT", "UPDATE"] },
  { table: "drives", grants: ["SELECT", "INSERT", "UPDATE"] },
  { table: "boards", grants: ["SELECT", "INSERT", "UPDATE"] },
  { table: "chips", grants: ["SELECT", "INSERT", "UPDATE"] },
  { table: "images", grants: ["SELECT", "INSERT", "UPDATE (state, facts, engine_version, checked_at)"] },
  { table: "comparisons", grants: ["SELECT", "INSERT"] },
  {
    table: "reads",
    grants: ["SELECT", "INSERT",
      "UPDATE (findings, engine_version, counted, set_aside_reason, set_aside_by, set_aside_at)"],
  },
  { table: "approval_requests", grants: ["SELECT", "INSERT", "UPDATE (sent_back_by, sent_back_at, sent_back_reason)"] },
  { table: "approvals", grants: ["SELECT", "INSERT", "UPDATE (revoked_at, revoked_by, revoked_cause, revoked_reason)"] },
  { table: "transfers", grants: ["SELECT", "INSERT"] },
  { table: "mails", grants: ["SELECT", "INSERT", "UPDATE"] },
  { table: "shares", grants: ["SELECT", "INSERT", "UPDATE (opened_at, withdrawn_at)"] },
  { table: "idempotency_keys", grants: ["SELECT", "INSERT", "UPDATE", "DELETE"] },
];
