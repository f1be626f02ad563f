import { Link } from "expo-router";
import Head from "expo-router/head";
import { Fragment, type ReactNode } from "react";
import { View } from "react-native";

import { useWords } from "@features/i18n";

import { Text } from "./text";
import { breakpoint, layout, typeScale, useBreakpoint, useTheme, webStyle } from "./theme";

export interface Crumb {
  label: string;
  href: string;
}

export function Breadcrumb({ crumbs }: { crumbs: readonly Crumb[] }) {
  const { colour } = useTheme();
  const t = useWords("ui");
  if (crumbs.length === 0) return null;
  return (
    <View
      role="navigation"
      aria-label={t("page.breadcrumb")}
      style={{ flexDirection: "row", flexWrap: "wrap", gap: 6, marginBottom: 4 }}
    >
      {crumbs.map((crumb, index) => (
        <Fragment key={crumb.href}>
          {index > 0 ? (
            <Text variant="small" tone="ink3" hidden>
              /
            </Text>
          ) : null}
          <Link
            href={crumb.href}
            style={{ ...typeScale.small, color: colour.ink2, paddingVertical: 4 }}
          >
            {crumb.label}
          </Link>
        </Fragment>
      ))}
    </View>
  );
}

export interface PageHeaderProps {
  /** The h1. */
  title: string;
  crumbs?: readonly Crumb[];
  /** A small line above or below: the site, the day. */
  kicker?: string;
  subtitle?: ReactNode;
  /** A LoopTag before the title. */
  tag?: ReactNode;
  actions?: ReactNode;
}

export function PageHeader(props: PageHeaderProps) {
  const phone = useBreakpoint() === "phone";
  return (
    <View
      style={{
        flexDirection: phone ? "column" : "row",
        justifyContent: "space-between",
        alignItems: phone ? "stretch" : "flex-end",
        gap: phone ? 14 : 20,
        marginBottom: phone ? 16 : 22,
        zIndex: 20,
      }}
    >
      <View style={{ flexShrink: 1, minWidth: 0 }}>
        <Breadcrumb crumbs={props.crumbs ?? []} />
        {props.kicker ? (
          <Text variant={phone ? "small" : "bodyWide"} tone="ink2">
            {props.kicker}
          </Text>
        ) : null}
        <View style={{ flexDirection: "row", alignItems: "center", gap: 12, flexWrap: "wrap" }}>
          {props.tag}
          <Text variant={props.tag || props.crumbs?.length ? "title" : "display"} level={1}>
            {props.title}
          </Text>
        </View>
        {typeof props.subtitle === "string" ? (
          <Text tone="ink2">{props.subtitle}</Text>
        ) : (
          props.subtitle
        )}
      </View>
      {props.actions ? (
        <View style={{ flexDirection: "row", flexWrap: "wrap", gap: 12, alignItems: "flex-start" }}>
          {props.actions}
        </View>
      ) : null}
    </View>
  );
}

export interface ScreenProps extends Partial<PageHeaderProps> {
  /** Title of the browser tab and the h1. */
  title: string;
  /** The page draws its own h1. */
  headerHidden?: boolean;
  /** An Inspector beside the page. */
  aside?: ReactNode;
  /** Buttons pinned to the foot of the page. */
  footer?: ReactNode;
  /** Text pages and forms stay readable. */
  narrow?: boolean;
  children: ReactNode;
}

/** One page: browser title, the main landmark, the h1, and room for an inspector and pinned buttons. */
export function Screen(props: ScreenProps) {
  const size = useBreakpoint();
  const { margin } = layout[size];
  const { aside, footer, narrow, headerHidden, children, ...header } = props;
  return (
    <View style={{ flexDirection: "row", flexGrow: 1, minWidth: 0 }}>
      <Head>
        <title>{`${props.title} · Loopwright`}</title>
      </Head>
      <View style={{ flex: 1, minWidth: 0, maxWidth: breakpoint.max }}>
        <View
          role="main"
          id="main"
          tabIndex={-1}
          {...{ dataSet: { programmaticFocus: "true" } }}
          style={{
            flexGrow: 1,
            paddingHorizontal: margin,
            paddingTop: size === "phone" ? 20 : 24,
            paddingBottom: 28,
          }}
        >
          <View style={narrow ? { maxWidth: 720, width: "100%" } : null}>
            {headerHidden ? null : <PageHeader {...header} />}
            {children}
          </View>
        </View>
        {footer ? <Footer>{footer}</Footer> : null}
      </View>
      {aside}
    </View>
  );
}

/** Pinned to the foot of the page: above the bar on a phone, at the bottom edge elsewhere. */
export function Footer({ children }: { children: ReactNode }) {
  const { colour } = useTheme();
  const size = useBreakpoint();
  const phone = size === "phone";
  return (
    <View
      style={[
        {
          backgroundColor: colour.pad,
          borderTopWidth: 1,
          borderTopColor: colour.rule,
          paddingVertical: 12,
          paddingHorizontal: layout[size].margin,
          flexDirection: "row",
          flexWrap: "wrap",
          gap: 12,
          justifyContent: phone ? "flex-start" : "flex-end",
          alignItems: "center",
        },
        webStyle({ position: "sticky", bottom: phone ? layout.phone.bottomBar : 0, zIndex: 10 }),
      ]}
    >
      {children}
    </View>
  );
}
