/** One line of JSON per event. Facts are counts, kinds, codes and ids: never an address, a link or a reply's text. */
export type Log = (level: "info" | "warn" | "error", event: string, facts?: Record<string, string | number | boolean>) => void;

export const jsonLog: Log = (level, event, facts = {}) => {
  process.stdout.write(`${JSON.stringify({ at: new Date().toISOString(), level, event, ...facts })}\n`);
};

/** What an error is, without what it says: messages of drivers and servers may hold addresses. */
export function faultOf(error: unknown): Record<string, string> {
  if (!(error instanceof Error)) return { fault: typeof error };
  const { code } = error as { code?: unknown };
  const where = error.stack?.split("\n").find((line) => line.includes("/lib/"))?.trim() ?? "";
  return { fault: error.name, ...(typeof code === "string" ? { code } : {}), where: where.replace(/^at /, "").replace(/\(?(?:file:\/\/)?\/.*\/(?=lib\/)/, "") };
}
