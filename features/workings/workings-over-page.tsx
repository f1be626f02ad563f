import { useWorkings } from "./use-workings";
import { WorkingsSheet } from "./workings-panel";

/** Workings of a figure whose key names point and range, over whatever page it was opened on. */
export function WorkingsOverPage() {
  const { open, close } = useWorkings();
  if (open?.pointId === undefined || open.from === undefined || open.to === undefined) return null;
  const { figure, register, pointId, from, to } = open;
  return <WorkingsSheet asked={{ figure, register, pointId, from, to }} onClose={close} />;
}
