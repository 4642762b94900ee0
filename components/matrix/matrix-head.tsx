import type { Header } from "./header";
import { hueStyle } from "./weave";

/** Column headings with their axis's hue along the lower edge; `roles` adds what `role="grid"` wants. */
export function MatrixHead({ columns, roles }: Readonly<{ columns: readonly Header[]; roles?: boolean }>) {
  const row = roles ? { "aria-rowindex": 1 } : {};
  return (
    <thead>
      <tr {...row}>
        <td />
        {columns.map((column, c) => (
          <th key={headerKey(column, c)} scope="col" aria-colindex={roles ? c + 2 : undefined} style={hueStyle(column.axis)}>
            {column.label}
            {column.unit ? <span className="block text-xs">{column.unit}</span> : null}
          </th>
        ))}
      </tr>
    </thead>
  );
}

export function RowHead({ row, roles }: Readonly<{ row: Header; roles?: boolean }>) {
  return (
    <th scope="row" aria-colindex={roles ? 1 : undefined} style={hueStyle(row.axis)}>
      {row.label}
      {row.unit ? <span className="text-xs"> {row.unit}</span> : null}
    </th>
  );
}

/** Place is what makes a row or column of a matrix itself; names may repeat while they are being typed. */
export const headerKey = (header: Header, index: number) => `${index} ${header.label}`;
export const cellKey = (r: number, c: number) => `${r},${c}`;
