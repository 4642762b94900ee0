import "server-only";
import { z } from "zod";
import { answer } from "@/lib/api/answer";
import { refuseForeignOrigin } from "@/lib/api/same-origin";
import { env } from "@/lib/env";
import { callNextAuth } from "./call-next-auth";
import { orRefusal } from "./refusal";

const Params = z.object({ nextauth: z.array(z.string().max(40)).max(3) });
type RouteContext = { readonly params: Promise<unknown> };

/** next-auth behind the same origin check, body limit, problems and log line as every other route. */
export function handleAuth(request: Request, context: RouteContext): Promise<Response> {
  return answer(request, async () => {
    if (request.method !== "GET") refuseForeignOrigin(request.headers, new URL(env().NEXTAUTH_URL).origin);
    const { nextauth } = Params.catch({ nextauth: [] }).parse(await context.params);
    return orRefusal(() => callNextAuth(request, nextauth));
  });
}
