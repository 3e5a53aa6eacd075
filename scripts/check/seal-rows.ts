import { QueryTypes, type Transaction } from "sequelize";
import { connection } from "@/models";
import type { SealRow } from "./seals";

/** their lists of heads are large */
const PAGE = 25;

/** Every seal in the order of the numbers, a few at a time. */
export async function* sealRows(tx: Transaction): AsyncGenerator<SealRow> {
  for (let after = -1; ; ) {
    const rows = await connection().query<SealRow>(
      `SELECT number, text, LOWER(HEX(sha256)) AS sha256, LOWER(HEX(prev)) AS prev, key_id AS keyId, signature, cause,
         DATE_FORMAT(made_at, '%Y-%m-%dT%H:%i:%s.%fZ') AS madeAt, chains, leaves
       FROM seals WHERE number > ? ORDER BY number LIMIT ${PAGE}`,
      { replacements: [after], transaction: tx, type: QueryTypes.SELECT },
    );
    yield* rows;
    if (rows.length < PAGE) return;
    after = rows[rows.length - 1].number;
  }
}
