"use client";
import { useEffect, useState } from "react";
import { Button } from "@/components/ui/button";

/** Without a script the browser's own command does the same, so the button comes with the script. */
export function PrintButton({ label }: { label: string }) {
  const [scripted, setScripted] = useState(false);
  useEffect(() => setScripted(true), []);
  return scripted ? (
    <Button type="button" look="quiet" onClick={() => window.print()}>
      {label}
    </Button>
  ) : null;
}
