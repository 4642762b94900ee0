import { ArrowDown, ArrowUp, X } from "lucide-react";
import { Button } from "../../ui/button";

const ACTS = {
  up: { icon: ArrowUp, says: (name: string) => `Move ${name} up` },
  down: { icon: ArrowDown, says: (name: string) => `Move ${name} down` },
  remove: { icon: X, says: (name: string) => `Remove ${name}` },
} as const;

type RowButtonProps = Readonly<{ act: keyof typeof ACTS; name: string; disabled?: boolean; onClick: () => void }>;

/** At the end of a row of the editor; says which row it is for. */
export function RowButton({ act, name, disabled, onClick }: RowButtonProps) {
  const { icon: Icon, says } = ACTS[act];
  return (
    <Button size="small" tone="quiet" className="h-9" aria-label={says(name)} disabled={disabled} onClick={onClick}>
      <Icon aria-hidden size={16} />
    </Button>
  );
}
