const { getDefaultConfig } = require("expo/metro-config");
const http = require("node:http");
const path = require("node:path");

const config = getDefaultConfig(__dirname);

// Server code, build output, data and tests never enter the client bundle or the file watcher, so
// a client import of them fails the build instead of shipping.
const keptOut = ["server", "dist", "var", "test", "scripts", "stubs"];
const escapeForPattern = (text) => text.replace(/[.*+?^${}()|[\]\\/]/g, "\\$&");
config.resolver.blockList = [
  ...[config.resolver.blockList].flat().filter(Boolean),
  ...keptOut.map(
    (folder) => new RegExp(`^${escapeForPattern(path.join(__dirname, folder))}\\/.*$`),
  ),
  /\.test\.tsx?$/,
];

// zod's root re-exports every message locale, which Metro cannot shake off: keep English, our own
// messages come from the server's problem codes anyway.
const resolveBefore = config.resolver.resolveRequest;
config.resolver.resolveRequest = (context, name, platform) => {
  const fromZod = /node_modules\/zod\//.test(context.originModulePath);
  const wanted = fromZod && name === "../locales/index.js" ? "../locales/en.js" : name;
  return (resolveBefore ?? context.resolveRequest)(context, wanted, platform);
};

// In development the API lives behind the page's own address, as in production: cookies, the CSRF
// guard and relative links then behave the same.
const apiPort = process.env.LOOPWRIGHT_PORT || "4070";
config.server.enhanceMiddleware = (metro) => (request, response, next) => {
  if (!request.url.startsWith("/api/")) return metro(request, response, next);
  const onward = http.request(
    {
      host: "127.0.0.1",
      port: apiPort,
      path: request.url,
      method: request.method,
      headers: request.headers,
    },
    (answer) => {
      response.writeHead(answer.statusCode, answer.headers);
      answer.pipe(response);
    },
  );
  onward.on("error", (error) => {
    response.writeHead(502, { "content-type": "text/plain; charset=utf-8" });
    response.end(`The Loopwright server on port ${apiPort} does not answer: ${error.message}`);
  });
  request.pipe(onward);
};

module.exports = config;
