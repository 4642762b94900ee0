import { ScrollBox } from "@/components/ui/scroll-box";
import type { ReadableOperation } from "@/lib/api/readable-description";
import { Shape } from "./shape";

type OperationProps = Readonly<{ origin: string; operation: ReadableOperation }>;

export function Operation({ origin, operation }: OperationProps) {
  const { id, method, path, summary, access, parameters, body, replies } = operation;
  const refused = replies.filter(({ status }) => Number(status) >= 400);
  return (
    <article id={id} aria-labelledby={`${id}-title`} className="mb-6 scroll-mt-4">
      <h3 id={`${id}-title`} className="font-semibold">
        {summary}
      </h3>
      <p className="font-mono text-table break-words">
        {method} {path}
      </p>
      <dl className="mt-1 grid grid-cols-[max-content_1fr] gap-x-4 text-table max-sm:grid-cols-1">
        <Fact name="For">{access}</Fact>
        {parameters.length > 0 ? (
          <Fact name="Takes">
            <ul>
              {parameters.map(({ name, place, type, required }) => (
                <li key={`${place} ${name}`}>
                  <code>{name}</code>
                  {required ? "*" : ""} in the {place}: {type}
                </li>
              ))}
            </ul>
          </Fact>
        ) : null}
        {body ? (
          <Fact name="Body">
            <Shape text={body} />
          </Fact>
        ) : null}
        {replies
          .filter(({ status }) => Number(status) < 400)
          .map(({ status, description, type }) => (
            <Fact key={status} name={status}>
              {description} {type ? <Shape text={type} /> : null}
            </Fact>
          ))}
        <Fact name="Refused">{refused.map(({ status }) => status).join(", ")}</Fact>
      </dl>
      {operation.example ? <WorkedRequest origin={origin} operation={operation} /> : null}
    </article>
  );
}

function Fact({ name, children }: Readonly<{ name: string; children: React.ReactNode }>) {
  return (
    <>
      <dt className="text-soft">{name}</dt>
      <dd className="min-w-0 break-words">{children}</dd>
    </>
  );
}

function WorkedRequest({ origin, operation: { method, path, summary, example } }: OperationProps) {
  const lines = [
    `curl ${origin}${path} --request ${method} \\`,
    `  --header "Authorization: Bearer $GAINWRIGHT_TOKEN" \\`,
    `  --header "Content-Type: application/json" \\`,
    `  --data @- <<'END'`,
    example,
    "END",
  ];
  return (
    <ScrollBox label={`Worked request: ${summary}`}>
      <pre className="mt-2 w-max min-w-full border border-rule bg-sheet p-3 font-mono text-xs">{lines.join("\n")}</pre>
    </ScrollBox>
  );
}
