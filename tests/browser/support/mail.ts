const sink = process.env["MAIL_SINK_URL"] ?? "";

export type SunkMail = { id: number; to: string; subject: string; text: string; html: string };

/** The newest mail to an address that fits, as soon as the sink has it. */
export async function waitForMail(to: string, fits: (mail: SunkMail) => boolean = () => true, withinMs = 60_000): Promise<SunkMail> {
  const until = Date.now() + withinMs;
  for (;;) {
    const { messages } = (await (await fetch(`${sink}/messages?to=${encodeURIComponent(to)}`)).json()) as { messages: SunkMail[] };
    const found = messages.find((mail) => mail.to === to && fits(mail));
    if (found) return found;
    if (Date.now() > until) throw new Error(`no mail for ${to} within ${withinMs / 1000} s`);
    await new Promise((resolve) => setTimeout(resolve, 200));
  }
}

export const rawMail = async (id: number): Promise<string> => (await fetch(`${sink}/messages/${id}/raw`)).text();

/** The first address in a text that fits. */
export function linkIn(text: string, pattern: RegExp): string {
  const found = text.match(/https?:\/\/[^\s<>"]+/g)?.find((link) => pattern.test(link));
  if (!found) throw new Error(`no link like ${pattern} in the mail`);
  return found;
}
