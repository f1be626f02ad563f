const webPreset = require("jest-expo/web/jest-preset");

// Packages that ship only modern or untranspiled source and so go through Babel for the client.
const transpiled = [
  "(jest-)?react-native",
  "@react-native(-community)?",
  "expo(nent)?",
  "@expo(nent)?/.*",
  "react-navigation",
  "@react-navigation/.*",
  "@shopify/react-native-skia",
  "victory-native",
  "its-fine",
  "d3-.*",
  "internmap",
  "react-native-svg",
  "standard-navigation",
];

const aliases = {
  "^@(app|features|shared|server|assets|test)/(.*)$": "<rootDir>/$1/$2",
};

// Node projects only strip types and turn modules into CommonJS: no React Native preset, so the
// server's code runs as close as possible to what production runs, and files load fast.
const stripTypes = [
  "babel-jest",
  {
    configFile: false,
    babelrc: false,
    plugins: [
      ["@babel/plugin-transform-typescript", { allowDeclareFields: true }],
      "@babel/plugin-transform-modules-commonjs",
    ],
  },
];

const nodeProject = {
  testEnvironment: "node",
  transform: { "^.+\\.[mc]?[jt]sx?$": stripTypes },
  // These ship modern modules only, which Jest cannot require as they are.
  transformIgnorePatterns: ["/node_modules/(?!(d3-.*|internmap)/)"],
  moduleNameMapper: aliases,
};

/** @type {import("jest").Config} */
module.exports = {
  testSequencer: "<rootDir>/scripts/jest-order.cjs",
  // Real databases and real files on two busy cores: the usual five seconds is too tight.
  testTimeout: 30000,
  projects: [
    {
      displayName: "client",
      preset: "jest-expo/web",
      testMatch: ["<rootDir>/features/**/*.test.{ts,tsx}", "<rootDir>/test/app/**/*.test.{ts,tsx}"],
      setupFilesAfterEnv: ["<rootDir>/jest.setup.client.ts"],
      // d3 ships .mjs files, which the preset's own pattern does not match.
      transform: { "\\.mjs$": webPreset.transform["\\.[jt]sx?$"] },
      transformIgnorePatterns: [
        `/node_modules/(?!(${transpiled.join("|")}))`,
        "/node_modules/react-native-reanimated/plugin/",
        "/node_modules/@react-native/babel-preset/",
      ],
    },
    {
      ...nodeProject,
      displayName: "domain",
      testMatch: [
        "<rootDir>/shared/**/*.test.ts",
        "<rootDir>/test/reference/**/*.test.ts",
        "<rootDir>/test/generators/**/*.test.ts",
        "<rootDir>/test/checks/**/*.test.ts",
      ],
    },
    {
      ...nodeProject,
      displayName: "server",
      testMatch: [
        "<rootDir>/server/**/*.test.ts",
        "<rootDir>/test/server/**/*.test.ts",
        "<rootDir>/test/api/**/*.test.ts",
        "<rootDir>/test/kill/**/*.test.ts",
      ],
      globalSetup: "<rootDir>/scripts/jest-database-start.mjs",
      globalTeardown: "<rootDir>/scripts/jest-database-stop.mjs",
    },
    {
      ...nodeProject,
      displayName: "browser",
      testMatch: ["<rootDir>/test/e2e/**/*.e2e.ts"],
      globalSetup: "<rootDir>/scripts/jest-browser-start.mjs",
      globalTeardown: "<rootDir>/scripts/jest-database-stop.mjs",
    },
  ],
};
