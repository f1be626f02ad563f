import expo from "eslint-config-expo/flat.js";
import prettier from "eslint-config-prettier";
import boundaries from "eslint-plugin-boundaries";
import { defineConfig } from "eslint/config";

// What each folder may import. The order matters: the first pattern that fits names the element.
const elements = [
  { type: "kit", pattern: "features/ui" },
  { type: "api-client", pattern: "features/api" },
  { type: "i18n", pattern: "features/i18n" },
  { type: "charts", pattern: "features/charts" },
  { type: "workings", pattern: "features/workings" },
  { type: "feature", pattern: "features/*", capture: ["feature"] },
  { type: "route", pattern: "app" },
  { type: "server", pattern: "server" },
  { type: "shared", pattern: "shared" },
  { type: "assets", pattern: "assets" },
  { type: "test", pattern: "test" },
  { type: "scripts", pattern: "scripts" },
];

// The chart kit is a folder of its own only so that it can be loaded on demand; workings open from
// every figure of every screen.
const featureBase = ["kit", "charts", "workings", "api-client", "i18n", "shared", "assets"];
// Where a feature's screens live is the one thing another feature may know: links need it.
const files = [{ category: "paths", pattern: "features/*/*-paths.ts" }];

function arrow(from, to, message) {
  return [
    { from: { element: { type: from } }, disallow: { to: { element: { type: "*" } } }, message },
    ...to.map((type) => ({
      from: { element: { type: from } },
      allow: { to: { element: { type } } },
    })),
  ];
}

const arrows = [
  ...arrow(
    "route",
    ["route", "feature", ...featureBase],
    "A route file only names a screen: import from features, never from the server.",
  ),
  ...arrow(
    "feature",
    featureBase,
    "A feature imports the kit, the API client, the words, shared code and itself: move what two features need into features/ui or shared.",
  ),
  {
    from: { element: { type: "feature" } },
    allow: {
      to: {
        element: { type: "feature", captured: { feature: "{{ from.element.captured.feature }}" } },
      },
    },
  },
  {
    from: { element: { type: "feature" } },
    allow: { to: { file: { categories: "paths" } } },
  },
  ...arrow(
    "charts",
    ["charts", "kit", "i18n", "shared", "assets"],
    "The chart kit draws what it is given: hand it columns, not a feature's or the API's things.",
  ),
  ...arrow(
    "workings",
    ["workings", "api-client", "kit", "i18n", "shared"],
    "Workings know a figure by its key: hand them that, not a screen's own things.",
  ),
  {
    from: { element: { type: "workings" } },
    allow: { to: { file: { categories: "paths" } } },
  },
  ...arrow(
    "kit",
    ["kit", "i18n", "shared", "assets"],
    "The kit knows no feature and no endpoint: hand it values and callbacks as props.",
  ),
  ...arrow(
    "api-client",
    ["api-client", "kit", "i18n", "shared"],
    "The API client knows contracts and how to show an answer: screens import it, not the other way round.",
  ),
  ...arrow("i18n", ["i18n", "shared"], "Words and formats know shared code only."),
  ...arrow(
    "server",
    ["server", "shared", "assets"],
    "The server imports shared code only: what client and server both need belongs in shared.",
  ),
  ...arrow(
    "shared",
    ["shared"],
    "Shared code imports nothing outside shared: pass in what it needs as an argument.",
  ),
];

const colourMessage =
  "A colour is written once, in features/ui/theme: use a token, so both themes and contrast hold.";
const colour = String.raw`/^#([0-9a-fA-F]{3,4}|[0-9a-fA-F]{6}|[0-9a-fA-F]{8})$|\b(rgb|hsl)a?\(/`;
const noColourLiterals = [
  { selector: `Literal[value=${colour}]`, message: colourMessage },
  { selector: `TemplateElement[value.raw=${colour}]`, message: colourMessage },
];
const noTypeLiterals = ["fontFamily", "fontSize", "lineHeight", "letterSpacing"].map((name) => ({
  selector: `Property[key.name='${name}'] > Literal.value`,
  message: "Type is set once, in the kit: use one of its text styles instead of a font literal.",
}));

const pureMessage =
  "Shared code is a function of its arguments: take the instant, the number or the setting as one.";
const noAmbientInputs = [
  { object: "Date", property: "now", message: pureMessage },
  { object: "Math", property: "random", message: pureMessage },
  { object: "performance", property: "now", message: pureMessage },
];

const outsideShared = {
  group: ["react", "react-*", "react-native*", "expo*", "express*", "sequelize*", "node:*", "fs"],
  message:
    "Shared code runs in the browser, in the server and in workers: no framework and no I/O.",
};
const rawControls = {
  name: "react-native",
  importNames: ["Text", "TextInput", "Button", "Alert"],
  message:
    "Use the kit's text, field, button and dialog: they carry the label, the type and the focus ring.",
};
const serverInClient = {
  group: ["@server/*", "express", "sequelize", "mariadb", "node:*"],
  message: "Client code reaches the server through the API only.",
};

const nodeGlobals = Object.fromEntries(
  ["process", "Buffer", "URL", "console", "setTimeout", "clearTimeout", "setInterval"]
    .concat(["clearInterval", "setImmediate", "fetch", "AbortSignal", "globalThis", "__dirname"])
    .concat(["require", "module"])
    .map((name) => [name, "readonly"]),
);

export default defineConfig([
  {
    ignores: [
      "node_modules/**",
      "dist/**",
      "dist.new/**",
      "var/**",
      ".expo/**",
      "public/canvaskit*",
      "test/fixtures/**",
      "stubs/**",
      "expo-env.d.ts",
    ],
  },
  expo,
  prettier,
  {
    linterOptions: { reportUnusedDisableDirectives: "error", noInlineConfig: true },
  },
  {
    files: ["**/*.{ts,tsx}"],
    rules: {
      "@typescript-eslint/no-explicit-any": "error",
      "@typescript-eslint/ban-ts-comment": "error",
      "@typescript-eslint/no-unused-vars": [
        "error",
        {
          args: "after-used",
          argsIgnorePattern: "^_",
          varsIgnorePattern: "^_",
          caughtErrors: "all",
        },
      ],
      "no-empty": ["error", { allowEmptyCatch: false }],
      // The compiler knows what a namespace holds, and this rule took two thirds of the whole run.
      "import/namespace": "off",
      // These three mistake ordinary uses of i18next, axe and callbacks for slips.
      "import/no-named-as-default-member": "off",
      "import/no-named-as-default": "off",
      "react/display-name": "off",
      eqeqeq: ["error", "smart"],
    },
  },
  {
    files: ["{app,features,server,shared}/**/*.{ts,tsx}"],
    plugins: { boundaries },
    settings: { "boundaries/elements": elements, "boundaries/files": files },
    rules: { "boundaries/dependencies": ["error", { default: "allow", policies: arrows }] },
  },
  {
    // A test may reach for factories and for the other side of a seam.
    files: ["**/*.test.{ts,tsx}"],
    rules: { "boundaries/dependencies": "off" },
  },
  {
    files: ["{app,features}/**/*.{ts,tsx}"],
    rules: {
      "no-restricted-imports": ["error", { paths: [rawControls], patterns: [serverInClient] }],
      "no-restricted-syntax": ["error", ...noColourLiterals, ...noTypeLiterals],
    },
  },
  {
    files: ["features/ui/**/*.{ts,tsx}"],
    rules: {
      "no-restricted-imports": ["error", { patterns: [serverInClient] }],
      "no-restricted-syntax": ["error", ...noColourLiterals],
    },
  },
  { files: ["features/ui/theme/**"], rules: { "no-restricted-syntax": "off" } },
  {
    files: ["shared/**/*.ts"],
    ignores: ["**/*.test.ts"],
    rules: {
      "no-restricted-imports": ["error", { patterns: [outsideShared] }],
      "no-restricted-properties": ["error", ...noAmbientInputs],
      "no-restricted-globals": [
        "error",
        ...["process", "window", "document", "fetch", "localStorage", "Buffer"].map((name) => ({
          name,
          message: pureMessage,
        })),
      ],
      "no-restricted-syntax": [
        "error",
        { selector: "NewExpression[callee.name='Date'][arguments.length=0]", message: pureMessage },
        { selector: "CallExpression[callee.name='Date']", message: pureMessage },
      ],
    },
  },
  {
    files: ["{server,scripts,test}/**", "*.{js,mjs}"],
    languageOptions: { globals: nodeGlobals },
    // These guard code that Metro bundles; Node reads its environment at run time.
    rules: { "expo/no-dynamic-env-var": "off", "expo/no-env-var-destructuring": "off" },
  },
  {
    files: ["**/*.test.{ts,tsx}", "test/**", "jest.setup.client.ts"],
    rules: { "@typescript-eslint/no-require-imports": "off" },
  },
]);
