"use client";
import type { ReactNode } from "react";
import { useFormStatus } from "react-dom";

/** A button that says the result; while the work runs it says so and can't be pressed twice. */
export function SubmitButton({ children, busy, look = "primary", name, value }: { children: ReactNode; busy: ReactNode; look?: "primary" | "secondary" | "quiet"; name?: string; value?: string }) {
  const { pending } = useFormStatus();
  return (
    <button type="submit" name={name} value={value} aria-disabled={pending} className={`btn ${look === "primary" ? "pri" : look === "quiet" ? "quiet" : ""}`}>
      {pending ? busy : children}
    </button>
  );
}
