import { TableCards } from "./table-cards";
import type { TableProps } from "./table-props";

/** React Native has no table elements: off the web every row is a card. */
export function Table<Row>(props: TableProps<Row>) {
  return <TableCards {...props} />;
}
