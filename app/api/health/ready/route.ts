import { databaseAnswers } from "@/lib/services/health/database-answers";

/** Ready: the database answers too, so requests can be sent here. */
export async function GET() {
  if (await databaseAnswers()) return Response.json({ status: "ready" });
  return Response.json({ status: "database away" }, { status: 503, headers: { "Retry-After": "5" } });
}
