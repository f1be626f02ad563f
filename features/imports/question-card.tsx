import type { ReactNode } from "react";
import { View } from "react-native";
import { Card, Mark, Row, Text } from "@features/ui";

/** Frame of a question: brass mark, what is not known, what was seen, the answers. */
export function QuestionCard(props: { title: string; text: string; children?: ReactNode }) {
  return (
    <Card pad={5} label={props.title}>
      <Row gap={3} align="flex-start">
        <Mark kind="look" size={22} />
        <View style={{ flex: 1, minWidth: 0, gap: 4 }}>
          <Text variant="subhead" level={2}>
            {props.title}
          </Text>
          <Text variant="bodyWide" tone="ink2">
            {props.text}
          </Text>
        </View>
      </Row>
      {props.children ? <View style={{ marginTop: 14, gap: 12 }}>{props.children}</View> : null}
    </Card>
  );
}
