import { expect, test } from "vitest";
import { HOME, NextPath } from "@/lib/schemas/next-path";

test.each(["/", "/plants", "/plants/1?tab=checks#modes", "/plants?search=a%2Fb", "/docs/api", "/plants/%E2%82%AC", "/a//b"])(
  "%j is a place of ours to go on to after signing in",
  (path) => {
    expect(NextPath.parse(path)).toBe(path);
  },
);

const hostile = [
  "//elsewhere.example",
  "///elsewhere.example",
  "/\\elsewhere.example",
  "\\\\elsewhere.example",
  "/\t/elsewhere.example",
  "/\n/elsewhere.example",
  "/ /elsewhere.example",
  "/%2Felsewhere.example",
  "/%2f%2felsewhere.example",
  "/%5Celsewhere.example",
  "/%09/elsewhere.example",
  "/a\\..\\..\\elsewhere.example",
  " /plants",
  "https://elsewhere.example/plants",
  "http:elsewhere.example",
  "javascript:alert(1)",
  "data:text/html,x",
  "plants",
  "",
  "?next=//x",
  "/\u2028/elsewhere.example",
  "/\u0000",
  `/${"a".repeat(3000)}`,
  undefined,
  null,
  ["/plants"],
  { toString: () => "/plants" },
];
test.each(hostile)("%j is not, and leads home instead", (path) => {
  expect(NextPath.parse(path)).toBe(HOME);
});

test("what is let through never leaves our origin when a browser reads it", () => {
  const characters = [
    "/",
    "\\",
    "\t",
    "\n",
    "\r",
    "%2f",
    "%5c",
    "@",
    ":",
    ".",
    "a",
    "?",
    "#",
    ";",
    "\u00a0",
    "\u3000",
    "／",
    "。",
  ];
  let seed = 12345;
  const next = () => {
    seed = (seed * 1103515245 + 12345) % 2147483648;
    return seed;
  };
  for (let round = 0; round < 20_000; round++) {
    const path = Array.from({ length: 1 + (next() % 8) }, () => characters[next() % characters.length]).join("");
    const url = new URL(NextPath.parse(path), "https://gainwright.example");
    expect(url.origin, JSON.stringify(path)).toBe("https://gainwright.example");
  }
});
