"use client";

import { Button } from "@/components/ui/button";
import { Icon } from "@/components/ui/icon";

export function PrintButton() {
  return <Button onClick={() => window.print()}><Icon name="print" />Print</Button>;
}
