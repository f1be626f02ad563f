import { useQuery } from "@tanstack/react-query";
import { router, useLocalSearchParams } from "expo-router";
import { View } from "react-native";
import { FailedAnswer } from "@features/api";
import { useWords } from "@features/i18n";
import {
  Button,
  LoadingBlocks,
  LoopTag,
  Row,
  Screen,
  Steps,
  Text,
  useBreakpoint,
  useScrollTop,
} from "@features/ui";
import type { ImportDetail } from "@shared/contracts/imports";
import { ChecksStep } from "./checks-step";
import { ColumnsStep } from "./columns-step";
import { EndedView } from "./ended-view";
import { FileStep } from "./file-step";
import { importPaths } from "./import-paths";
import { importQuery, useImportActions } from "./imports-queries";
import { serviceOfLoop } from "./loop-service";
import { ProgressView } from "./progress-view";
import { ResultStep } from "./result-step";
import { TimeStep } from "./time-step";
import { WizardFooter } from "./wizard-footer";
import { currentStep, furthestStep, WIZARD_STEPS, type WizardStep } from "./wizard-steps";

/** One import, from its files to its result; the step is in the URL. */
export function ImportScreen() {
  const t = useWords("imports");
  const { importId } = useLocalSearchParams<{ importId: string }>();
  const query = useQuery(importQuery(importId));
  if (query.data) return <Wizard detail={query.data} />;
  return (
    <Screen title={t("wizard.title")} crumbs={[{ label: t("logs.title"), href: importPaths.logs }]}>
      {query.error ? (
        <FailedAnswer error={query.error} onRetry={() => void query.refetch()} />
      ) : (
        <LoadingBlocks />
      )}
    </Screen>
  );
}

function Wizard({ detail }: { detail: ImportDetail }) {
  const t = useWords("imports");
  const { step: asked } = useLocalSearchParams<{ step?: string }>();
  const actions = useImportActions(detail.id);
  const step = currentStep(detail, asked);
  // A step's questions stand first; it would open where the one before was scrolled to.
  useScrollTop(step);
  const go = (to: WizardStep) => router.setParams({ step: to });
  const furthest = WIZARD_STEPS.indexOf(furthestStep(detail));
  const ended =
    detail.state === "undone" || detail.state === "failed" || detail.state === "cancelled";
  const place = WIZARD_STEPS.indexOf(step);
  return (
    <Screen
      title={t("wizard.title")}
      headerHidden
      footer={
        ended || detail.state === "importing" ? undefined : (
          <WizardFooter step={step} detail={detail} actions={actions} onGo={go} />
        )
      }
    >
      <WizardHeader detail={detail} />
      {ended ? (
        <EndedView detail={detail} actions={actions} />
      ) : (
        <View style={{ gap: 24 }}>
          <Steps
            label={t("wizard.steps")}
            current={step}
            steps={WIZARD_STEPS.map((key, index) => ({
              key,
              label: t(`wizard.step.${key}`),
              done: index < place || (key === "result" && detail.state === "imported"),
            }))}
            reachable={(key) =>
              detail.state !== "imported" &&
              detail.state !== "importing" &&
              WIZARD_STEPS.indexOf(key) <= furthest
            }
            onChange={go}
          />
          <StepBody step={step} detail={detail} actions={actions} />
        </View>
      )}
    </Screen>
  );
}

function StepBody(props: {
  step: WizardStep;
  detail: ImportDetail;
  actions: ReturnType<typeof useImportActions>;
}) {
  const { step, detail } = props;
  if (detail.state === "importing") {
    return <ProgressView {...props} />;
  }
  switch (step) {
    case "file":
      return <FileStep {...props} />;
    case "columns":
      return <ColumnsStep {...props} />;
    case "time":
      return <TimeStep {...props} />;
    case "checks":
      return <ChecksStep {...props} />;
    case "result":
      return <ResultStep {...props} />;
  }
}

function WizardHeader({ detail }: { detail: ImportDetail }) {
  const t = useWords("imports");
  const phone = useBreakpoint() === "phone";
  const tag = <LoopTag tag={detail.loop.tag} service={serviceOfLoop(detail.loop.service)} />;
  const close = (
    <Button kind="quiet" icon="close" iconOnly label={t("wizard.close")} href={importPaths.logs} />
  );
  if (phone) {
    return (
      <Row gap={2} justify="space-between" style={{ marginBottom: 12 }}>
        <Row gap={1}>
          {close}
          <Text variant="bodyWide" tone="ink2" level={1}>
            {t("wizard.title")}
          </Text>
        </Row>
        {tag}
      </Row>
    );
  }
  return (
    <Row gap={4} justify="space-between" align="flex-start" style={{ marginBottom: 20 }}>
      <View style={{ gap: 4 }}>
        <Text variant="small" tone="ink2">
          {`${t("logs.title")} / ${detail.site.name}`}
        </Text>
        <Row gap={4} wrap>
          <Text variant="title">{t("wizard.title")}</Text>
          {tag}
          <Text tone="ink2">{detail.buildingName ?? detail.loop.name}</Text>
        </Row>
      </View>
      {close}
    </Row>
  );
}
