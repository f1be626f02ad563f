import { Mark, Row, Text } from "@features/ui";

/** A word of safety beside the field it concerns: short and quiet. It replaces no site rule. */
export function Caution({ children }: { children: string }) {
  return (
    <Row gap={2} align="flex-start">
      <Mark kind="note" size={16} silent />
      <Text variant="small" tone="ink2" style={{ flex: 1, minWidth: 0 }}>
        {children}
      </Text>
    </Row>
  );
}
