import { type ApiDescription, describeApi } from "@/lib/api/openapi";
import { catalogue } from "./catalogue";

let described: Promise<ApiDescription> | undefined;

/** Made once, on first use: it asks every route what it declares. */
export function apiDescription(): Promise<ApiDescription> {
  described ??= describeApi(catalogue);
  return described;
}
