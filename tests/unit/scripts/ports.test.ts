import { createServer } from "node:net";
import { expect, test } from "vitest";
import { assertPortsFree, freePorts, portsFrom } from "#scripts/ports.js";

test("without a setting the ports are 4310 to 4314, with one the others follow it", () => {
  expect(portsFrom(undefined)).toEqual({ app: 4310, idp: 4311, mailPage: 4312, smtp: 4313, weather: 4314 });
  expect(portsFrom("5000")).toEqual({ app: 5000, idp: 5001, mailPage: 5002, smtp: 5003, weather: 5004 });
});

test.each(["80a", "0", "-1", "4310.5", "65532", "99999"])("PORT=%s is refused", (wanted) => {
  expect(() => portsFrom(wanted)).toThrow("which is no port");
});

test("a taken port is named together with a way round it, and is free again afterwards", async () => {
  const ports = await freePorts();
  const holder = createServer();
  await new Promise<void>((resolve) => holder.listen(ports.mailPage, "127.0.0.1", resolve));
  await expect(assertPortsFree(ports)).rejects.toThrow(`Port ${ports.mailPage} is taken by another program.`);
  await new Promise((resolve) => holder.close(resolve));
  await expect(assertPortsFree(ports)).resolves.toBeUndefined();
});
