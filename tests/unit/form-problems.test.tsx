// @vitest-environment happy-dom
import { act } from "react";
import { createRoot, type Root } from "react-dom/client";
import { afterEach, beforeEach, expect, test } from "vitest";
import { type FormProblem, FormProblems } from "@/components/ui/form-problems";
import { TextArea } from "@/components/ui/text-area";
import { TextField } from "@/components/ui/text-field";
import { useSubmit } from "@/components/ui/use-submit";
import { RequestProblem } from "@/lib/client/request";

// React's own switch for tests that drive it with act().
Object.assign(globalThis, { IS_REACT_ACT_ENVIRONMENT: true });

let host: HTMLElement;
let root: Root;
beforeEach(() => {
  host = document.body.appendChild(document.createElement("div"));
  root = createRoot(host);
});
afterEach(() => {
  act(() => root.unmount());
  host.remove();
});

function Form({ problems, attempt }: Readonly<{ problems: readonly FormProblem[]; attempt: number }>) {
  return (
    <form>
      <FormProblems problems={problems} attempt={attempt} />
      <TextField id="person" label="Your name" optional />
      <TextArea id="note" label="Note" />
    </form>
  );
}

/** What the summary lists once fields and summary are there. */
function listed(...problems: FormProblem[]): (string | null)[] {
  act(() => root.render(<Form problems={[]} attempt={0} />));
  act(() => root.render(<Form problems={problems} attempt={1} />));
  return [...host.querySelectorAll("li")].map((item) => item.textContent);
}

test("a single problem names its field, for away from the field nobody knows what “here” is", () => {
  expect(listed({ fieldId: "person", message: "Write a name here" })).toEqual(["Your name: Write a name here"]);
  expect(host.querySelector("li a")?.getAttribute("href")).toBe("#person");
  expect(document.activeElement?.id).toBe("person");
});

test("a field of several lines is named too, and nothing is named twice", () => {
  expect(listed({ fieldId: "note", message: "At most 2,000 characters" })).toEqual(["Note: At most 2,000 characters"]);
  expect(listed({ fieldId: "note", message: "Note is too long" })).toEqual(["Note is too long"]);
});

test("a problem of no field, or of one that is not on the page, stands as it is", () => {
  const messages = ["You are not connected", "Write a value"];
  expect(listed({ message: messages[0] }, { fieldId: "gone", message: messages[1] })).toEqual(messages);
});

function Solving() {
  const { attempt, problems, busy, run } = useSubmit({ "/recipe": "person" });
  const solve = () => run(() => Promise.reject(tooMany()));
  return (
    <>
      <FormProblems title="This could not be solved yet." {...{ attempt, problems }} />
      <input id="person" defaultValue="0.25" />
      <button type="button" aria-busy={busy} onClick={solve}>
        Solve
      </button>
    </>
  );
}

function tooMany() {
  const detail = "At most 30 computations a minute for you. Wait 12 s, then try again.";
  return new RequestProblem({ code: "too-many-requests", status: 429, title: "Too many requests", detail, retryAfter: 12 });
}

test("a request over its limit is refused in words with the seconds to wait, and what was typed stays", async () => {
  act(() => root.render(<Solving />));
  await act(async () => host.querySelector("button")?.click());
  expect(host.querySelector("[role=alert]")?.textContent).toContain("This could not be solved yet.");
  expect(host.querySelector("li")?.textContent).toContain("Wait 12 s, then try again.");
  expect(host.querySelector("input")?.value).toBe("0.25");
  expect(host.querySelector("button")?.getAttribute("aria-busy")).toBe("false");
});
