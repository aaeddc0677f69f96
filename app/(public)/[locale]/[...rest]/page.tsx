import { notFound } from "next/navigation";

// Rendered on demand and never kept: addresses that don't exist are without number.
export const dynamic = "force-dynamic";

export default function Rest(): never {
  notFound();
}
