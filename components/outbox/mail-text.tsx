import { Fragment } from "react";

const ADDRESS = /(https?:\/\/[^\s<>"']+)/;

/** A mail's words with the links into this service made to work; an address of anywhere else stays text. */
export function MailText({ text, origin }: Readonly<{ text: string; origin: string }>) {
  return (
    <p className="max-w-prose break-words whitespace-pre-wrap">
      {text.split(ADDRESS).map((part, index) => {
        const place = `${index} ${part}`;
        const path = part.startsWith(`${origin}/`) ? part.slice(origin.length) : null;
        if (path === null) return <Fragment key={place}>{part}</Fragment>;
        // A plain link: a full load, as from a mail program.
        return (
          <a key={place} href={path} className="break-all">
            {part}
          </a>
        );
      })}
    </p>
  );
}
