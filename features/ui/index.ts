export { Banner, type BannerProps } from "./banner";
export { BrandMark } from "./brand-mark";
export { Button, type ButtonKind, type ButtonProps } from "./button";
export {
  addDays,
  addMonths,
  dayInZone,
  daysInclusive,
  isoWeek,
  mondayOf,
  weeksOfMonth,
} from "./calendar";
export { Card, Divider, type CardProps } from "./card";
export { CheckBox, CheckField, type CheckFieldProps } from "./check-field";
export { Chip, TapChip, type ChipProps, type TapChipProps } from "./chip";
export { ChoiceTiles, type Choice, type ChoiceTilesProps } from "./choice-tiles";
export { DateField, type DateFieldProps } from "./date-field";
export { DateRange, type DateRangeProps, type DateRangeValue } from "./date-range";
export { Dialog, type DialogProps } from "./dialog";
export { DottedRule } from "./dotted-rule";
export { DraftNotice } from "./draft-notice";
export { DropZone } from "./drop-zone";
export type { DropZoneProps } from "./drop-zone-props";
export { type FieldProps } from "./field-frame";
export { Figure, useSaidFigure, type FigureProps } from "./figure";
export { Formula, FormulaSymbol, type FormulaPiece } from "./formula";
export { FieldGroup, FieldRow, Form, type FormProps } from "./form";
export { Icon, type IconProps } from "./icon";
export type { IconName } from "./icon-paths";
export {
  DefinitionRows,
  ListRow,
  type Definition,
  type DefinitionRowsProps,
  type ListRowProps,
} from "./list-row";
export { LoopCard, type LoopCardProps, type ShownValue } from "./loop-card";
export { LoopTag, type LoopTagProps, type Service } from "./loop-tag";
export { Mark, MarkedText, type MarkKind } from "./mark";
export { Menu, type MenuItem, type MenuProps } from "./menu";
export { NumberField, type NumberFieldProps } from "./number-field";
export {
  Breadcrumb,
  Footer,
  PageHeader,
  Screen,
  type Crumb,
  type PageHeaderProps,
  type ScreenProps,
} from "./page";
export {
  closedLoop,
  hollowCore,
  loopHalves,
  pipeStroke,
  serviceColours,
  type ServiceColours,
} from "./pipe-drawing";
export { PipeSection, useBoreText, type PipeSectionProps } from "./pipe-section";
export { ProgressLoop, StageList, type ProgressLoopProps, type StageState } from "./progress-loop";
export {
  QualityKey,
  QualityPatterns,
  QualityRect,
  QualityStrip,
  type Quality,
  type QualityStretch,
} from "./quality";
export { readTypedNumber, type TypedNumber } from "./read-number";
export { barRun, railRun, risingRun, type Span } from "./run-line";
export { Segments, type SegmentsProps } from "./segments";
export { SelectField, type SelectFieldProps } from "./select-field";
export { ReasonSheet } from "./reason-sheet";
export { Inspector, Sheet, type SheetProps } from "./sheet";
export { squaredPaper } from "./squared-paper";
export { Spark, sparkPath, sparkRange, type SparkProps, type SparkRange } from "./spark";
export { Row, Stack } from "./stack";
export {
  DeniedState,
  EmptyState,
  ErrorState,
  LoadingBlocks,
  OfflineState,
  type BlockShape,
  type ErrorStateProps,
} from "./states";
export { Steps, type Step, type StepsProps } from "./steps";
export { SwitchField, type SwitchFieldProps } from "./switch-field";
export { Table } from "./table";
export type { Column, RowCard, TableFigure, TableProps } from "./table-props";
export { Tabs, type TabsProps } from "./tabs";
export { Inline, Strong, Text, type TextProps } from "./text";
export { TextField, type TextFieldProps } from "./text-field";
export { TextLink, type TextLinkProps } from "./text-link";
export * from "./theme";
export { ToastProvider, useToast, type ToastMessage } from "./toast";
export { useDraft, type Draft } from "./use-draft";
export { useScrollTop } from "./use-scroll-top";
export { useSpans } from "./use-spans";
export { VisuallyHidden } from "./visually-hidden";
export { WeekPicker, type WeekPickerProps } from "./week-picker";
export { WorkedOutField, type WorkedOutFieldProps } from "./worked-out-field";
