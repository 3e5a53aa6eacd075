"use client";

import { zodResolver } from "@hookform/resolvers/zod";
import { useRouter } from "next/navigation";
import { useState } from "react";
import { useForm } from "react-hook-form";
import type { z } from "zod";
import { Button } from "@/components/ui/button";
import { FormDialog } from "@/components/ui/form-dialog";
import { Note } from "@/components/ui/note";
import { useChange } from "@/components/ui/use-change";
import { send } from "@/lib/http/send";
import { type DriveInput, driveInput } from "@/lib/schemas/drive";
import { DriveFields } from "./drive-fields";

function AddDriveForm({ caseId, onClose }: { caseId: string; onClose(): void }) {
  const router = useRouter();
  const { refusal, busy, attempt } = useChange();
  const { register, handleSubmit, formState: { errors } } = useForm<z.input<typeof driveInput>, unknown, DriveInput>({ resolver: zodResolver(driveInput) });
  const submit = handleSubmit(async (input) => {
    if (!(await attempt(() => send("POST", `/api/cases/${caseId}/drives`, input)))) return;
    router.refresh();
    onClose();
  });
  return (
    <FormDialog onClose={onClose} title="Add a drive" description="Type what the label says, exactly." action="Add the drive" busy={busy} refusal={refusal} onSubmit={() => void submit()}>
      <DriveFields register={register} errors={errors} />
      <Note kind="caution" title="Keep the enclosure's small board with the drive.">It may hold the key to the data.</Note>
    </FormDialog>
  );
}

export function AddDrive({ caseId, lead }: { caseId: string; lead?: boolean }) {
  const [open, setOpen] = useState(false);
  return (
    <>
      <Button variant={lead ? "lead" : "plain"} onClick={() => setOpen(true)}>Add a drive…</Button>
      {open ? <AddDriveForm caseId={caseId} onClose={() => setOpen(false)} /> : null}
    </>
  );
}
