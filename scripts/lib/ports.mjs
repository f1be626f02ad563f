import net from "node:net";

/** A port on loopback that nothing listens on at this moment. */
export function freePort() {
  return new Promise((resolve, reject) => {
    const probe = net.createServer();
    probe.on("error", reject);
    probe.listen(0, "127.0.0.1", () => {
      const { port } = probe.address();
      probe.close(() => resolve(port));
    });
  });
}

/** Whether something already listens on this port of any local address. */
export function isPortTaken(port) {
  return new Promise((resolve, reject) => {
    const probe = net.createServer();
    probe.on("error", (error) => (error.code === "EADDRINUSE" ? resolve(true) : reject(error)));
    probe.listen(port, () => probe.close(() => resolve(false)));
  });
}
