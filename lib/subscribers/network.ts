/**
 * The sender that our own proxy (or the connection itself) names last; for IPv6 its network of 64 bits.
 * @param forwardedFor `X-Forwarded-For`: what came from outside stands before what our proxy adds
 */
export function networkOf(forwardedFor: string | null): string {
  const address = forwardedFor?.split(",").at(-1)?.trim() ?? "";
  if (!address.includes(":") || address.includes(".")) return address.replace(/^::ffff:/i, "");
  const [head = "", tail = ""] = address.toLowerCase().split("::");
  const left = head.split(":").filter(Boolean);
  const right = tail.split(":").filter(Boolean);
  const groups = address.includes("::") ? [...left, ...Array<string>(Math.max(0, 8 - left.length - right.length)).fill("0"), ...right] : left;
  return groups
    .slice(0, 4)
    .map((group) => group.replace(/^0+(?=.)/, ""))
    .join(":");
}
