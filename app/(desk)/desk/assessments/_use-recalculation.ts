"use client";
import { useQuery, useQueryClient } from "@tanstack/react-query";
import { useEffect, useRef, useState } from "react";
import type { RecalculationLine, RecalculationRefusal } from "@/lib/assessments/recalculation";

const DEBOUNCE_MS = 250;
type Shown = Extract<RecalculationLine, { kind: "view" }>;
type Outcome = Exclude<RecalculationLine, { kind: "progress" }> | RecalculationRefusal;

/** What the form would send; React's own bookkeeping left out. */
export function serialise(form: HTMLFormElement): string {
  const fields = [...new FormData(form)].filter(([name, value]) => !name.startsWith("$") && typeof value === "string") as [string, string][];
  return new URLSearchParams(fields).toString();
}

async function recalculate(body: string, signal: AbortSignal, onProgress: (share: number) => void): Promise<Outcome> {
  const response = await fetch("/api/desk/recalculate", { method: "POST", body, signal, headers: { "Content-Type": "application/x-www-form-urlencoded" } });
  if (response.status >= 400 && response.status < 500) return (await response.json()) as RecalculationRefusal;
  if (!response.ok || !response.body) throw new Error(`status ${response.status}`);
  let rest = "";
  let last: Outcome | null = null;
  const reader = response.body.pipeThrough(new TextDecoderStream()).getReader();
  for (;;) {
    const { done, value } = await reader.read();
    if (done) break;
    const lines = (rest + value).split("\n");
    rest = lines.pop() ?? "";
    for (const line of lines) {
      const step = JSON.parse(line) as RecalculationLine;
      if (step.kind === "progress") onProgress(step.share);
      else last = step;
    }
  }
  if (!last) throw new Error("the answer broke off");
  return last;
}

/**
 * Figures that follow the form: waits for a pause in typing, ends the request before, keeps the last figures until the
 * new ones are there. `saved` are the figures of the stored state.
 */
export function useRecalculation(assessmentId: string, saved: Shown | null) {
  const client = useQueryClient();
  const start = useRef<string | null>(null);
  const timer = useRef<ReturnType<typeof setTimeout>>(undefined);
  const [body, setBody] = useState<string | null>(null);
  const [typing, setTyping] = useState(false);
  const [edited, setEdited] = useState(false);
  const [cancelled, setCancelled] = useState(false);
  const [progress, setProgress] = useState(0);
  const [last, setLast] = useState<Shown | null>(saved);
  const key = ["recalculate", assessmentId, body];

  const { data, isFetching, isError, refetch } = useQuery({
    queryKey: key,
    enabled: body !== null && !cancelled,
    queryFn: ({ signal }) => {
      setProgress(0);
      return recalculate(body ?? "", signal, setProgress);
    },
  });
  useEffect(() => {
    if (data?.kind === "view") setLast(data);
  }, [data]);
  useEffect(() => () => clearTimeout(timer.current), []);

  const settle = (next: string) => {
    setTyping(false);
    setBody(next === start.current ? null : next);
    if (next === start.current) setLast(saved);
  };
  return {
    shown: last,
    edited,
    working: edited && !cancelled && (typing || isFetching),
    progress,
    cancelled,
    lost: isError && !isFetching,
    outcome: edited && !typing && !isFetching ? data : undefined,
    /** Remembers what is stored, before the first change. */
    begin: (form: HTMLFormElement) => {
      start.current ??= serialise(form);
    },
    follow: (form: HTMLFormElement) => {
      const next = serialise(form);
      setEdited(next !== start.current);
      setTyping(true);
      setCancelled(false);
      clearTimeout(timer.current);
      timer.current = setTimeout(() => settle(next), DEBOUNCE_MS);
    },
    cancel: () => {
      clearTimeout(timer.current);
      setCancelled(true);
      setTyping(false);
      void client.cancelQueries({ queryKey: key });
    },
    again: () => {
      setCancelled(false);
      if (body !== null) void refetch();
    },
  };
}
