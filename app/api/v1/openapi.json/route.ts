import { DESCRIPTION } from "@/lib/api/openapi";
import { publicRoute } from "@/lib/api/route";
import { apiDescription } from "./description";

export const GET = publicRoute(DESCRIPTION, async () => ({ body: { ...(await apiDescription()) } }));
