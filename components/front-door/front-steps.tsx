const STEPS: readonly { readonly title: string; readonly words: string }[] = [
  {
    title: "Enter the plant",
    words: "Axes, signals with units and limits, and the matrices: typed, or pasted from a spreadsheet, as numbers or formulas.",
  },
  {
    title: "Read the checks",
    words: "Which modes can be steered and seen, by which actuator and sensor, and how much one axis acts on another.",
  },
  {
    title: "Design",
    words:
      "By weights or by poles, with an observer for what is not measured. Each result is verified, or refused with the reason.",
  },
  {
    title: "Lay side by side",
    words:
      "Weights, gains, poles and responses of up to six designs in line, each choice with its reason; then take the gains along.",
  },
];

/** The job in four steps. */
export function FrontSteps() {
  return (
    <ol className="border-b border-rule">
      {STEPS.map(({ title, words }, index) => (
        <li key={title} className="flex gap-4 border-t border-rule py-2.5">
          <span aria-hidden="true" className="font-mono text-lg text-soft">
            {index + 1}
          </span>
          <div>
            <h2 className="text-base">{title}</h2>
            <p className="text-table text-soft">{words}</p>
          </div>
        </li>
      ))}
    </ol>
  );
}
