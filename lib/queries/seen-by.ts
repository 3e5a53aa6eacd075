import { Op } from "sequelize";
import { refsIn, withoutRefs } from "@/lib/core/other-cases";
import type { Actor } from "@/lib/core/words";
import { Case } from "@/models";

/**
 * A view as this actor may read it: for an auditor with a case list the numbers of other cases are left out of findings,
 * reasons and sentences. The log's bodies stay word for word: they are what the signatures cover.
 */
export async function seenBy<T>(actor: Actor, view: T): Promise<T> {
  if (!actor.cases) return view;
  const refs = refsIn(view);
  if (refs.length === 0) return view;
  const others = await Case.findAll({ attributes: ["ref"], where: { ref: refs, id: { [Op.notIn]: [...actor.cases] } } });
  return withoutRefs(view, new Set(others.map((one) => one.ref)));
}
