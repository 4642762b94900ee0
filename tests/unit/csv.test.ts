import { expect, test } from "vitest";
import { contentDisposition } from "@/lib/files/content-disposition";
import { toCsv } from "@/lib/files/csv";

test.each([
  ["=1+1", "'=1+1"],
  ["+1", "'+1"],
  ["-1", "'-1"],
  ["@SUM(A1)", "'@SUM(A1)"],
  ["\t=1", '"\'\t=1"'],
  ["\r=1", '"\'\r=1"'],
  ["\n=1", '"\'\n=1"'],
  ["\tx", '"\'\tx"'],
  ["  =1", "'  =1"],
  ["\u00a0=1", "'\u00a0=1"],
  ["=cmd|' /C calc'!A0", "'=cmd|' /C calc'!A0"],
  ['=HYPERLINK("http://a.example","b")', '"\'=HYPERLINK(""http://a.example"",""b"")"'],
  ["-2+3,1", '"\'-2+3,1"'],
  ["\uff1d1", "'\uff1d1"],
  ["x;=1+1", '"x;=1+1"'],
])("the text %j is written as text, never as a formula", (text, written) => {
  expect(toCsv([[text]])).toBe(`${written}\r\n`);
});

test("a negative number in a number column stays the number it is", () => {
  expect(toCsv([["x", -1.5, 1e-7, -3e300, 0]])).toBe("x,-1.5,1e-7,-3e+300,0\r\n");
});

test("commas, quotes and line breaks are quoted, records end in CRLF and have equal width", () => {
  expect(toCsv([["a,b", 'c"d', "e\nf"], [" g "], [null, 1]])).toBe('"a,b","c""d","e\nf"\r\n" g ",,\r\n,1,\r\n');
});

test("every double comes back bit for bit", () => {
  const bits = new DataView(new ArrayBuffer(8));
  let state = 20_261_201n;
  for (let round = 0; round < 5_000; round++) {
    state = (state * 6_364_136_223_846_793_005n + 1_442_695_040_888_963_407n) & 0xffff_ffff_ffff_ffffn;
    bits.setBigUint64(0, state);
    const value = bits.getFloat64(0);
    if (!Number.isFinite(value)) continue;
    expect(Object.is(Number(toCsv([[value]])), value)).toBe(true);
  }
});

test("what is no finite number is refused instead of written", () => {
  for (const value of [Number.NaN, Number.POSITIVE_INFINITY]) expect(() => toCsv([[value]])).toThrow(RangeError);
});

test.each([
  ["gain.csv", 'attachment; filename="gain.csv"'],
  ['a"b\r\nSet-Cookie: x.csv', 'attachment; filename="a-b--Set-Cookie- x.csv"'],
  ["../../etc/passwd", 'attachment; filename="-..-etc-passwd"'],
  ["Träger ½.csv", `attachment; filename="Tr-ger -.csv"; filename*=UTF-8''Tr%C3%A4ger%20%C2%BD.csv`],
  ["it's (1).csv", `attachment; filename="it's (1).csv"`],
  ["é'(*).csv", `attachment; filename="-'(-).csv"; filename*=UTF-8''%C3%A9%27%28-%29.csv`],
  ["100%.csv", `attachment; filename="100-.csv"; filename*=UTF-8''100%25.csv`],
  ["\u202egpj.exe", 'attachment; filename="-gpj.exe"'],
  ["", 'attachment; filename="file"'],
])("the file name %j is offered so that no header can be broken", (name, header) => {
  expect(contentDisposition(name)).toBe(header);
  expect(header).toMatch(/^[\x20-\x7e]+$/);
});
