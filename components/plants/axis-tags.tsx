import { AxisBar } from "../plots/axis-bar";

/** The axes of a machine, each with its hue beside its written name. */
export function AxisTags({ axes }: Readonly<{ axes: readonly { readonly name: string; readonly tag: string }[] }>) {
  if (axes.length === 0) return <span className="text-soft">none</span>;
  return (
    <ul className="flex flex-wrap gap-x-3 gap-y-0.5">
      {axes.map(({ name, tag }, index) => (
        <li key={tag} className="flex items-baseline gap-1.5">
          <AxisBar axis={index} />
          {name}
        </li>
      ))}
    </ul>
  );
}
