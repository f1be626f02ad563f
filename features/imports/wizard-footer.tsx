import { View } from "react-native";
import { useWords } from "@features/i18n";
import { Button, Mark, Row, Text, useBreakpoint } from "@features/ui";
import { ApiError } from "@features/api";
import type { ImportDetail } from "@shared/contracts/imports";
import { stopsOf } from "./check-items";
import { importPaths } from "./import-paths";
import type { ImportActions } from "./imports-queries";
import { useUndoDialog } from "./result-step";
import { furthestStep, WIZARD_STEPS, type WizardStep } from "./wizard-steps";

interface WizardFooterProps {
  readonly step: WizardStep;
  readonly detail: ImportDetail;
  readonly actions: ImportActions;
  readonly onGo: (step: WizardStep) => void;
}

/** Back, what is in the way, and the one way on. */
export function WizardFooter(props: WizardFooterProps) {
  const { step, onGo } = props;
  const t = useWords("imports");
  const phone = useBreakpoint() === "phone";
  const place = WIZARD_STEPS.indexOf(step);
  const before = place > 0 ? WIZARD_STEPS[place - 1] : undefined;
  if (step === "result") return <ResultFooter {...props} />;
  return (
    <>
      {before ? (
        <Button kind="second" label={t("wizard.back")} onPress={() => onGo(before)} />
      ) : null}
      {phone ? null : (
        <View style={{ flexGrow: 1 }}>
          {step === "file" ? <Text tone="ink2">{t("wizard.nothingStored")}</Text> : null}
        </View>
      )}
      <Refusal {...props} />
      {step === "checks" ? <ConfirmButton {...props} /> : <NextButton {...props} />}
    </>
  );
}

function Refusal({ actions }: WizardFooterProps) {
  const failed = [
    actions.chooseRecipe,
    actions.chooseRepairs,
    actions.confirm,
    actions.removeFile,
  ].find((action) => action.error);
  if (!failed?.error) return null;
  const words =
    failed.error instanceof ApiError
      ? `${failed.error.problem.detail} ${failed.error.problem.remedy}`
      : failed.error.message;
  return (
    <View role="alert" style={{ flexShrink: 1 }}>
      <Row gap={2}>
        <Mark kind="wrong" size={20} silent />
        <Text variant="bodyWide">{words}</Text>
      </Row>
    </View>
  );
}

function NextButton({ step, detail, onGo }: WizardFooterProps) {
  const t = useWords("imports");
  const phone = useBreakpoint() === "phone";
  if (step === "checks" || step === "result") return null;
  const after = WIZARD_STEPS[WIZARD_STEPS.indexOf(step) + 1];
  if (!after) return null;
  const open = WIZARD_STEPS.indexOf(after) <= WIZARD_STEPS.indexOf(furthestStep(detail));
  return (
    <View style={{ flexGrow: phone ? 1 : 0 }}>
      <Button
        full={phone}
        label={t(`wizard.next.${step}`)}
        offBecause={open ? undefined : t(`wizard.first.${step}`)}
        onPress={() => onGo(after)}
      />
    </View>
  );
}

function ConfirmButton({ detail, actions }: WizardFooterProps) {
  const t = useWords("imports");
  const phone = useBreakpoint() === "phone";
  const { checks } = detail;
  const stops = checks ? stopsOf(checks, detail.repair) : 0;
  const rows = checks?.files.reduce((sum, file) => sum + file.rowsKept, 0) ?? 0;
  const twice = detail.files.some((file) => file.sameAs !== null);
  const why = !checks
    ? t("checks.working")
    : stops > 0
      ? t("checks.settleWhy")
      : twice
        ? t("checks.storedAlready")
        : undefined;
  return (
    <View style={{ flexGrow: phone ? 1 : 0 }}>
      <Button
        full={phone}
        label={
          stops > 0 && phone
            ? t("checks.settleFirst", { count: stops })
            : t("checks.confirm", { count: rows })
        }
        busy={actions.confirm.isPending}
        offBecause={why ?? (detail.can.confirm ? undefined : t("wizard.notYours"))}
        onPress={() => actions.confirm.mutate()}
      />
    </View>
  );
}

function ResultFooter({ detail, actions }: WizardFooterProps) {
  const t = useWords("imports");
  const phone = useBreakpoint() === "phone";
  const undo = useUndoDialog(detail, actions);
  return (
    <>
      {detail.can.undo ? (
        <Button
          kind="second"
          label={phone ? t("result.undoShort") : t("result.undo")}
          onPress={undo.ask}
        />
      ) : null}
      <View style={{ flexGrow: 1 }} />
      <Button label={t("result.done")} href={importPaths.logs} />
      {undo.dialog}
    </>
  );
}
