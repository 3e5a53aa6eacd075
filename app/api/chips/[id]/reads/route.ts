import { allow } from "@/lib/commands/refuse";
import { chipFor } from "@/lib/commands/place";
import { storeReads } from "@/lib/commands/store-reads";
import { othersThan } from "@/lib/http/others-than";
import { readFieldsOf } from "@/lib/http/read-fields";
import { uploadHandler } from "@/lib/http/upload-handler";

export const POST = uploadHandler(
  {
    status: 201, changes: true,
    before: async (actor, id) => {
      allow(actor, "read.store");
      await chipFor(actor, id);
    },
  },
  ({ actor, id, upload }) => storeReads(actor, id, readFieldsOf(upload), upload.files),
);
export const { GET, PUT, PATCH, DELETE, OPTIONS } = othersThan("POST");
