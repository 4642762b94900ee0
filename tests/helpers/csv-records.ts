/** RFC 4180, as a spreadsheet reads it. */
export function cellsOf(text: string): string[][] {
  const records: string[][] = [[]];
  for (const [, quoted, plain, end] of text.matchAll(/(?:"((?:[^"]|"")*)"|([^",\r\n]*))(,|\r\n)/g)) {
    records.at(-1)?.push(quoted?.replaceAll('""', '"') ?? plain);
    if (end === "\r\n") records.push([]);
  }
  return records;
}
