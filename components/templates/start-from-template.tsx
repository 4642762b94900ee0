"use client";

import { useRouter } from "next/navigation";
import { type FormEvent, useState } from "react";
import { RequestProblem } from "@/lib/client/request";
import { startFromTemplate } from "@/lib/client/templates";
import type { OpenParameter } from "@/lib/schemas/template";
import { useSession } from "../providers/session-provider";
import { Button } from "../ui/button";
import { FormProblems } from "../ui/form-problems";
import { NumberField } from "../ui/number-field";
import { TextField } from "../ui/text-field";
import { useCreateKey } from "../ui/use-create-key";
import { useSubmit } from "../ui/use-submit";
import { parameterProblem, rangeText } from "./parameter-problem";

type StartFromTemplateProps = Readonly<{ templateId: string; parameters: readonly OpenParameter[] }>;
type Values = Readonly<Record<string, number | null>>;

const fieldOf = (name: string) => `parameter-${name}`;
const NAMES = { "/plantName": "start-plant-name", "/designName": "start-design-name" };

/** The machine's own parameters, and from them a plant with its first design: both or neither. */
export function StartFromTemplate({ templateId, parameters }: StartFromTemplateProps) {
  const { resume } = useSession();
  const router = useRouter();
  const keyFor = useCreateKey();
  const [plantName, setPlantName] = useState("");
  const [designName, setDesignName] = useState("First design");
  const [values, setValues] = useState<Values>(() =>
    Object.fromEntries(parameters.map(({ name, suggested }) => [name, suggested])),
  );
  const [unread, setUnread] = useState<ReadonlySet<string>>(new Set());
  const fields = { ...NAMES, ...Object.fromEntries(parameters.map(({ name }) => [`/values/${name}`, fieldOf(name)])) };
  const { busy, attempt, problems, refusal, at, run } = useSubmit(fields);

  async function submit(event: FormEvent<HTMLFormElement>) {
    event.preventDefault();
    await run(async () => {
      const body = { plantName, designName, values: usable(parameters, values, unread) };
      const { plantId, designId } = await resume(() => startFromTemplate(templateId, body, keyFor(body)));
      router.push(`/plants/${plantId}/designs/${designId}`);
    });
  }

  const untouched = parameters.filter(({ name, suggested }) => values[name] === suggested).map(({ name }) => name);
  return (
    <form method="post" onSubmit={submit} noValidate className="flex max-w-xl flex-col gap-4 [&_[id$=-unit]]:w-24">
      <FormProblems title={refusal?.title ?? ""} {...{ attempt, problems }} />
      <TextField
        id={NAMES["/plantName"]}
        label="Name of the plant"
        autoComplete="off"
        value={plantName}
        onChange={({ target }) => setPlantName(target.value)}
        problem={at("/plantName")}
        hint="The machine this is for."
      />
      {parameters.map((parameter) => (
        <NumberField
          key={parameter.name}
          id={fieldOf(parameter.name)}
          label={<code>{parameter.name}</code>}
          unit={parameter.unit}
          value={values[parameter.name]}
          onChange={(value) => setValues((before) => ({ ...before, [parameter.name]: value }))}
          onUsable={(isUsable) => setUnread((before) => withOrWithout(before, parameter.name, !isUsable))}
          problem={parameterProblem(parameter, values[parameter.name]) ?? at(`/values/${parameter.name}`)}
          hint={<ParameterHint parameter={parameter} />}
        />
      ))}
      <TextField
        id={NAMES["/designName"]}
        label="Name of its first design"
        autoComplete="off"
        value={designName}
        onChange={({ target }) => setDesignName(target.value)}
        problem={at("/designName")}
      />
      {untouched.length > 0 ? (
        <p className="text-sm text-soft">
          Still the suggested value: <span className="font-mono">{untouched.join(", ")}</span>
        </p>
      ) : null}
      <div className="flex flex-wrap items-center gap-4">
        <Button type="submit" tone="primary" busy={busy}>
          {busy ? "Computing…" : "Start the plant and its design"}
        </Button>
        <span role="status" className="text-sm text-soft">
          {busy ? "The design is computed before anything is stored." : ""}
        </span>
      </div>
    </form>
  );
}

function ParameterHint({ parameter }: Readonly<{ parameter: OpenParameter }>) {
  return (
    <>
      <span className="font-mono">{rangeText(parameter)}</span>
      {parameter.help ? `. ${parameter.help}` : ""}
    </>
  );
}

/** @throws RequestProblem for what cannot be sent yet, at its fields, as the service would */
function usable(parameters: readonly OpenParameter[], values: Values, unread: ReadonlySet<string>): Record<string, number> {
  const errors = parameters.flatMap((parameter) => {
    const { name } = parameter;
    const value = values[name];
    const detail = unread.has(name)
      ? `${name}: this is not a number yet`
      : value === null
        ? `${name}: write a value, ${rangeText(parameter)}`
        : parameterProblem(parameter, value);
    return detail ? [{ pointer: `/values/${name}`, detail }] : [];
  });
  if (errors.length > 0) {
    const detail = "Correct the values listed.";
    throw new RequestProblem({ code: "invalid", status: 422, title: "Some values cannot be taken", detail, errors });
  }
  return Object.fromEntries(Object.entries(values).flatMap(([name, value]) => (value === null ? [] : [[name, value]])));
}

function withOrWithout(set: ReadonlySet<string>, name: string, present: boolean): ReadonlySet<string> {
  const next = new Set(set);
  if (present) next.add(name);
  else next.delete(name);
  return next;
}
