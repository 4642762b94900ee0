import type { ReactNode } from "react";
import { ScrollBox } from "../../ui/scroll-box";

type EditorTableProps = Readonly<{
  caption: string;
  headers: readonly string[];
  /** What the buttons at the end of a row are for. */
  buttons: string;
  children: ReactNode;
}>;

/** A table of fields with buttons at the end of each row; the rows are the caller's. */
export function EditorTable({ caption, headers, buttons, children }: EditorTableProps) {
  return (
    <ScrollBox label={caption}>
      <table className="w-full border-collapse text-table">
        <caption className="sr-only">{caption}</caption>
        <thead>
          <tr className="border-b border-ink text-left">
            {headers.map((header) => (
              <th key={header} scope="col" className="px-2 py-1 font-normal text-soft">
                {header}
              </th>
            ))}
            <th scope="col" className="sr-only">
              {buttons}
            </th>
          </tr>
        </thead>
        <tbody>{children}</tbody>
      </table>
    </ScrollBox>
  );
}
