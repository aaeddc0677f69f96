import { exportContext } from "@/lib/assessments/export-files";
import { download } from "../_download";

export async function GET(_: Request, { params }: { params: Promise<{ assessmentId: string }> }): Promise<Response> {
  return download((await params).assessmentId, exportContext);
}
