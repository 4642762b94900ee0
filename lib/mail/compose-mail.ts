import type { Mail } from "@/db/queries/outbox";

export type Letter = {
  readonly recipient: string;
  readonly subject: string;
  readonly paragraphs: readonly string[];
  readonly action?: { readonly label: string; readonly url: string };
  readonly closing: string;
};

/** Names of people and teams reach subjects: a line break in one would start a header of the writer's choice. */
const oneLine = (text: string) =>
  text
    .replace(/[\p{Cc}\p{Zl}\p{Zp}]+/gu, " ")
    .trim()
    .slice(0, 200);

const ENTITIES: Readonly<Record<string, string>> = { "&": "&amp;", "<": "&lt;", ">": "&gt;", '"': "&quot;", "'": "&#39;" };
const escaped = (text: string) => text.replace(/[&<>"']/g, (sign) => ENTITIES[sign] ?? sign);

/** The same words as plain text and as HTML without pictures, scripts or anything fetched from elsewhere. */
export function composeMail({ recipient, subject, paragraphs, action, closing }: Letter): Mail {
  const said = paragraphs.map(oneLineEach);
  const text = [...said, ...(action ? [`${action.label}:\n${action.url}`] : []), `-- \nGainwright\n${closing}`].join("\n\n");
  const button = action
    ? `<p><a href="${escaped(action.url)}" style="color:#1D2427;font-weight:600">${escaped(action.label)}</a></p>
<p style="font-size:12px;word-break:break-all">${escaped(action.url)}</p>`
    : "";
  const html = `<!doctype html>
<html lang="en"><body style="margin:0;padding:24px;background:#F7F5EF;color:#1D2427;font:15px/1.5 sans-serif">
${said.map((paragraph) => `<p>${escaped(paragraph)}</p>`).join("\n")}
${button}
<hr style="border:0;border-top:1px solid #DAD5C8"><p style="font-size:12px;color:#566064">Gainwright. ${escaped(closing)}</p>
</body></html>`;
  return { recipient: oneLine(recipient), subject: oneLine(subject), text, html };
}

const oneLineEach = (paragraph: string) => paragraph.split("\n").map(oneLine).join("\n");
