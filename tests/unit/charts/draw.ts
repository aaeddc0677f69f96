import { NextIntlClientProvider } from "next-intl";
import { createElement, type ReactElement } from "react";
import { renderToStaticMarkup } from "react-dom/server";
import messages from "@/messages/en.json";

/** Renders a drawing as a page would, and gives the attributes of what was drawn. */
export function draw(element: ReactElement) {
  const markup = renderToStaticMarkup(createElement(NextIntlClientProvider, { locale: "en", messages, timeZone: "UTC" } as never, element));
  const marks = [...markup.matchAll(/<[a-z]+ [^>]*data-[^>]*>/g)].map(([tag]) =>
    Object.fromEntries([...tag.matchAll(/([\w-]+)="([^"]*)"/g)].map(([, name, value]) => [name as string, value as string])),
  );
  return { markup, marks };
}

type Tick = { value: number; at: number };
/** Value of a position on a log axis, told from two of its drawn ticks only. */
export function onLogAxis(ticks: Tick[]): (at: number) => number {
  const [a, b] = [ticks[0], ticks.at(-1)] as [Tick, Tick];
  return (at) => Math.exp(Math.log(a.value) + ((at - a.at) / (b.at - a.at)) * Math.log(b.value / a.value));
}
export function onLinearAxis(ticks: Tick[]): (at: number) => number {
  const [a, b] = [ticks[0], ticks.at(-1)] as [Tick, Tick];
  return (at) => a.value + ((at - a.at) / (b.at - a.at)) * (b.value - a.value);
}
/** Half a pixel as a difference of values at a position. */
export const halfPixel = (valueAt: (at: number) => number, at: number) => Math.abs(valueAt(at + 0.5) - valueAt(at - 0.5)) / 2;
