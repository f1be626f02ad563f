import { useId, useRef, useState, type DragEvent } from "react";

import { useWords } from "@features/i18n";

import { Button } from "./button";
import { FieldNote } from "./field-frame";
import type { DropZoneProps } from "./drop-zone-props";
import { Icon } from "./icon";
import { Text } from "./text";
import { radius, useBreakpoint, useTheme } from "./theme";

/** Drag files here or browse. The border turns solid and blue while a file is over it. */
export function DropZone(props: DropZoneProps) {
  const { colour } = useTheme();
  const t = useWords("ui");
  const phone = useBreakpoint() === "phone";
  const [over, setOver] = useState(false);
  const input = useRef<HTMLInputElement>(null);
  // Leaving a child fires dragleave too: count in and out.
  const depth = useRef(0);
  const id = useId();

  const give = (list: FileList | null) => {
    const files = [...(list ?? [])];
    if (files.length > 0 && !props.disabled)
      props.onFiles(props.multiple ? files : files.slice(0, 1));
  };
  const stop = (event: DragEvent) => {
    event.preventDefault();
    event.stopPropagation();
  };

  return (
    <div>
      <div
        role="group"
        aria-label={props.label}
        aria-describedby={`${id}-note`}
        onDragEnter={(event) => {
          stop(event);
          depth.current += 1;
          setOver(true);
        }}
        onDragOver={stop}
        onDragLeave={(event) => {
          stop(event);
          depth.current -= 1;
          if (depth.current <= 0) setOver(false);
        }}
        onDrop={(event) => {
          stop(event);
          depth.current = 0;
          setOver(false);
          give(event.dataTransfer.files);
        }}
        style={{
          border: over ? `2.5px solid ${colour.mark}` : `2.5px dashed ${colour.ruleStrong}`,
          background: over ? colour.markTint : "transparent",
          borderRadius: radius.card,
          padding: phone ? 16 : 24,
          display: "flex",
          flexDirection: phone ? "column" : "row",
          alignItems: phone ? "stretch" : "center",
          gap: 16,
        }}
      >
        <div style={{ display: "flex", gap: 14, alignItems: "center", flex: 1, minWidth: 0 }}>
          <Icon name="download" size={34} />
          <div style={{ display: "flex", flexDirection: "column", minWidth: 0 }}>
            <Text variant="subhead" level="none">
              {over ? t("drop.letGo") : props.label}
            </Text>
            <Text variant="small" tone="ink2" id={`${id}-note`}>
              {props.hint}
            </Text>
          </div>
        </div>
        <Button
          kind="second"
          label={t(props.multiple ? "drop.browseMany" : "drop.browse")}
          full={phone}
          busy={props.disabled}
          onPress={() => input.current?.click()}
        />
        <input
          ref={input}
          type="file"
          tabIndex={-1}
          aria-label={props.label}
          accept={props.accept.join(",")}
          multiple={props.multiple}
          disabled={props.disabled}
          onChange={(event) => {
            give(event.target.files);
            // The same file may be picked again after a correction.
            event.target.value = "";
          }}
          style={{ display: "none" }}
        />
      </div>
      {props.error ? <FieldNote id={`${id}-error`} error={props.error} /> : null}
    </div>
  );
}
