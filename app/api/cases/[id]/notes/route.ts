import { addNote } from "@/lib/commands/add-note";
import { handler } from "@/lib/http/handler";
import { othersThan } from "@/lib/http/others-than";
import { notesOf } from "@/lib/queries/notes";
import { noteInput } from "@/lib/schemas/note";

export const GET = handler({}, ({ actor, params }) => notesOf(actor, params.id));
export const POST = handler({ input: noteInput, status: 201 }, ({ actor, params, input }) => addNote(actor, params.id, input));
export const { PUT, PATCH, DELETE, OPTIONS } = othersThan("GET", "POST");
