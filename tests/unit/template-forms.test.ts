import { expect, test } from "vitest";
import { parameterProblem, rangeText } from "@/components/templates/parameter-problem";
import { derivedNames, openParameters, type PublishRow, publishFields, startDraft } from "@/components/templates/publish-draft";
import { RequestProblem } from "@/lib/client/request";
import { OpenParameter } from "@/lib/schemas/template";
import { twoCarriages } from "../helpers/plant-content";

const mass: OpenParameter = { name: "m", unit: "kg", lowest: 2, highest: 20, suggested: 9, help: "" };

const row = (changes: Partial<PublishRow>): PublishRow => ({
  ...{ name: "m", unit: "kg", open: true, lowest: 2, highest: 20, suggested: 9, help: "", unread: new Set() },
  ...changes,
});

function refusal(work: () => unknown): RequestProblem {
  try {
    work();
  } catch (error) {
    if (error instanceof RequestProblem) return error;
    throw error;
  }
  throw new Error("nothing was refused");
}

test("a value is refused beyond its bounds and taken on them, while it is typed", () => {
  expect(parameterProblem(mass, 2)).toBeUndefined();
  expect(parameterProblem(mass, 20)).toBeUndefined();
  expect(parameterProblem(mass, 1.999)).toBe("m lies below the allowed 2 kg");
  expect(parameterProblem(mass, 20.001)).toBe("m lies above the allowed 20 kg");
  expect(parameterProblem(mass, null)).toBeUndefined();
});

test("bounds are shown in full, with a true minus sign", () => {
  expect(rangeText({ ...mass, lowest: -0.123456, highest: 200000 })).toBe("\u22120.123456 to 200000 kg");
});

test("only parameters that are plain numbers can be opened; those that follow from others are named", () => {
  const content = twoCarriages();
  expect(startDraft("Two carriages", content, "r").rows.map(({ name, suggested }) => [name, suggested])).toEqual([["m", 12]]);
  expect(derivedNames(content)).toEqual(["k", "wn"]);
});

test("the range of an opened parameter is left to the lead", () => {
  const [first] = startDraft("Two carriages", twoCarriages(), "r").rows;
  expect(first).toMatchObject({ open: false, lowest: null, highest: null });
});

test("what is not complete is refused at its own field, counted among the open ones as the service does", () => {
  const rows = [
    row({ name: "a", open: false }),
    row({ name: "b" }),
    row({ name: "c", lowest: null, unread: new Set(["highest"]) }),
  ];
  const { issues } = refusal(() => openParameters(rows));
  expect(issues).toEqual([
    { pointer: "/content/openParameters/1/lowest", detail: "Lowest c is missing" },
    { pointer: "/content/openParameters/1/highest", detail: "Highest c is not a number yet" },
  ]);
  const fields = publishFields(rows);
  for (const { pointer } of issues) expect(fields[pointer]).toMatch(/^open-c-/);
});

test("a template without an open parameter is refused before it is sent", () => {
  expect(refusal(() => openParameters([row({ open: false })])).issues).toEqual([
    { pointer: "/content/openParameters", detail: "Open at least one parameter" },
  ]);
});

test("complete rows become what the service takes", () => {
  const [made] = openParameters([row({ help: "weighed" })]);
  expect(OpenParameter.parse(made)).toEqual({ ...mass, help: "weighed" });
});
