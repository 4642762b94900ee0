import { jsonIn, noConnection, problemIn, RequestProblem, request } from "./request";

type AuthReply = { readonly url?: string };

/** The form that next-auth takes, with the token that ties it to this browser. @throws RequestProblem */
async function postForm(path: string, fields: Readonly<Record<string, string>>): Promise<Response> {
  const { data } = await request<{ csrfToken: string }>("/api/auth/csrf");
  try {
    return await fetch(path, {
      method: "POST",
      headers: { "content-type": "application/x-www-form-urlencoded", accept: "application/json" },
      credentials: "same-origin",
      cache: "no-store",
      body: new URLSearchParams({ ...fields, csrfToken: data.csrfToken, json: "true" }),
    });
  } catch {
    throw noConnection();
  }
}

function wrongSignIn(): RequestProblem {
  const detail = "The address or the password is not right. Check both; capitals count in the password.";
  return new RequestProblem({ code: "no-session", status: 401, title: "Not signed in", detail });
}

/** @throws RequestProblem: wrong address or password, too many tries, no connection */
export async function signIn(email: string, password: string): Promise<void> {
  const response = await postForm("/api/auth/callback/credentials", { email, password });
  if (response.headers.get("content-type")?.startsWith("application/problem+json")) throw await problemIn(response);
  const { url } = (await jsonIn(response)) as AuthReply;
  if (!response.ok || (url !== undefined && new URL(url, location.href).searchParams.has("error"))) throw wrongSignIn();
}

/** @throws RequestProblem: no connection, or the session could not be ended */
export async function signOut(): Promise<void> {
  const response = await postForm("/api/auth/signout", {});
  if (!response.ok) throw await problemIn(response);
}
