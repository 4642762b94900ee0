import { RequestProblem, request } from "./request";

type AuthReply = { readonly url?: string };

/** The form that next-auth takes, with the token that ties it to this browser. */
async function postForm(path: string, fields: Readonly<Record<string, string>>): Promise<Response> {
  const { data } = await request<{ csrfToken: string }>("/api/auth/csrf");
  return fetch(path, {
    method: "POST",
    headers: { "content-type": "application/x-www-form-urlencoded", accept: "application/json" },
    credentials: "same-origin",
    cache: "no-store",
    body: new URLSearchParams({ ...fields, csrfToken: data.csrfToken, json: "true" }),
  });
}

function wrongSignIn(): RequestProblem {
  const detail = "The address or the password is not right. Check both; capitals count in the password.";
  return new RequestProblem({ code: "no-session", status: 401, title: "Not signed in", detail });
}

/** @throws RequestProblem: wrong address or password, too many tries, no connection */
export async function signIn(email: string, password: string): Promise<void> {
  const response = await postForm("/api/auth/callback/credentials", { email, password });
  if (response.headers.get("content-type")?.startsWith("application/problem+json")) {
    throw new RequestProblem(await response.json());
  }
  const { url } = (await response.json()) as AuthReply;
  if (!response.ok || (url !== undefined && new URL(url, location.href).searchParams.has("error"))) throw wrongSignIn();
}

export async function signOut(): Promise<void> {
  await postForm("/api/auth/signout", {});
}
