import { ScrollBox } from "@/components/ui/scroll-box";
import type { ReadableSchema } from "@/lib/api/readable-description";
import type { ReadableField } from "@/lib/api/readable-schema";
import { Shape } from "./shape";

export function SchemaFields({ schema: { name, alternatives } }: Readonly<{ schema: ReadableSchema }>) {
  return (
    <div id={`shape-${name}`} className="mb-6 scroll-mt-4">
      <h3 className="font-mono font-semibold">{name}</h3>
      {alternatives.map((fields, index) => {
        const title = alternatives.length > 1 ? `${name}, form ${index + 1} of ${alternatives.length}` : name;
        return <Fields key={title} title={title} shown={alternatives.length > 1} fields={fields} />;
      })}
    </div>
  );
}

type FieldsProps = Readonly<{ title: string; shown: boolean; fields: readonly ReadableField[] }>;

function Fields({ title, shown, fields }: FieldsProps) {
  return (
    <ScrollBox label={`Fields of ${title}`}>
      <table className="mb-2 border-collapse text-table">
        <caption className={shown ? "text-left text-soft" : "sr-only"}>{title}</caption>
        <thead className="sr-only">
          <tr>
            <th scope="col">Field</th>
            <th scope="col">Type</th>
          </tr>
        </thead>
        <tbody>
          {fields.map(({ name, type, required, note }) => (
            <tr key={name} className="border-b border-rule">
              <th scope="row" className="py-0.5 pr-4 text-left align-baseline font-mono text-sm font-normal">
                {name}
                {required ? "*" : ""}
              </th>
              <td className="py-0.5">
                <Shape text={type} />
                {note && <span className="text-soft"> {note}</span>}
              </td>
            </tr>
          ))}
        </tbody>
      </table>
    </ScrollBox>
  );
}
