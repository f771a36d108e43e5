import { createServer, request as sendRequest } from "node:http";
import type { AddressInfo } from "node:net";
import { encode } from "next-auth/jwt";
import { NextRequest } from "next/server";
import { beforeAll, afterAll, describe, expect, it } from "vitest";
import { pinClientAddress } from "@/lib/server/client-address";
import { addressOf } from "@/lib/server/request";
import { proxy } from "@/proxy";

const SECRET = "only-for-this-test-0123456789abcdef";
const before = { ...process.env };
beforeAll(() => {
  process.env.AUTH_SECRET = SECRET;
  process.env.AUTH_URL = "http://localhost:3000";
});
afterAll(() => {
  process.env = before;
});

const ask = (path: string, init: { method?: string; headers?: Record<string, string> } = {}) =>
  proxy(
    new NextRequest(`http://localhost:3000${path}`, { ...init, headers: { host: "localhost:3000", ...init.headers } }),
  );
const isPassed = (response: Response) => response.headers.get("x-middleware-next") === "1";
const cookie = async (secret: string) =>
  `authjs.session-token=${await encode({ token: { sub: "x", sessionToken: "t" }, secret, salt: "authjs.session-token" })}`;

describe("before every page", () => {
  it.each(["/", "/sign-in", "/s/abc", "/join/abc", "/reset", "/api/v1/simulations", "/icon.svg"])(
    "%s opens without signing in",
    async (path) => {
      expect(isPassed(await ask(path))).toBe(true);
    },
  );

  it.each(["/scenarios", "/scenarios/1?at=2", "/workspace", "/s", "/no-such-page", "/sign-in/more"])(
    "%s asks for signing in and comes back",
    async (path) => {
      const response = await ask(path);
      expect(response.status).toBe(307);
      const target = new URL(response.headers.get("location")!);
      expect([target.origin, target.pathname, target.searchParams.get("from")]).toEqual([
        "http://localhost:3000",
        "/sign-in",
        path,
      ]);
    },
  );

  it("lets a sealed cookie through, and none that was sealed elsewhere", async () => {
    expect(isPassed(await ask("/scenarios", { headers: { cookie: await cookie(SECRET) } }))).toBe(true);
    expect(
      isPassed(await ask("/scenarios", { headers: { cookie: await cookie("another-secret-0123456789abcdef01") } })),
    ).toBe(false);
    expect(isPassed(await ask("/scenarios", { headers: { cookie: "authjs.session-token=x" } }))).toBe(false);
  });

  it("sends a strict policy with a nonce of its own each time, to the browser and to Next", async () => {
    const policies = await Promise.all(["/", "/"].map(async (path) => (await ask(path)).headers));
    const nonces = policies.map((headers) => /'nonce-([^']+)'/.exec(headers.get("content-security-policy")!)![1]);
    expect(nonces[0]).not.toBe(nonces[1]);
    const policy = policies[0]!.get("content-security-policy")!;
    expect(policies[0]!.get("x-middleware-request-content-security-policy")).toBe(policy);
    expect(policies[0]!.get("x-middleware-request-x-nonce")).toBe(nonces[0]);
    for (const rule of [
      "worker-src 'self'",
      "form-action 'self'",
      "object-src 'none'",
      "base-uri 'none'",
      "frame-ancestors 'none'",
    ])
      expect(policy).toContain(rule);
    expect(policy).not.toContain("unsafe-eval");
    expect(policy).not.toMatch(/script-src[^;]*unsafe-inline/);
  });

  it("replaces what a browser claims to be path and correlation id", async () => {
    const response = await ask("/s/abc", { headers: { "x-slackwater-path": "/evil", "x-correlation-id": "mine" } });
    expect(response.headers.get("x-middleware-request-x-slackwater-path")).toBe("/s/abc");
    expect(response.headers.get("x-middleware-request-x-correlation-id")).not.toBe("mine");
  });

  it("sends a browser from 127.0.0.1 on to localhost without a redirect", async () => {
    const response = await ask("/scenarios?x=1", { headers: { host: "127.0.0.1:3000", accept: "text/html" } });
    expect([response.status, response.headers.get("refresh")]).toEqual([
      200,
      "0; url=http://localhost:3000/scenarios?x=1",
    ]);
  });
});

describe("the address of a request", () => {
  it("is the connection's, whatever the header claims", async () => {
    pinClientAddress();
    const server = createServer((request, response) =>
      response.end(addressOf(new Headers({ "x-forwarded-for": String(request.headers["x-forwarded-for"]) }))),
    );
    await new Promise<void>((resume) => server.listen(0, "127.0.0.1", resume));
    const { port } = server.address() as AddressInfo;
    const answer = (headers: Record<string, string>) =>
      new Promise<string>((resume, fail) => {
        sendRequest(
          { port, host: "127.0.0.1", headers },
          (response) => void response.on("data", (data: Buffer) => resume(data.toString())),
        )
          .on("error", fail)
          .end();
      });
    expect(await answer({})).toBe("127.0.0.1");
    expect(await answer({ "x-forwarded-for": "203.0.113.9, 203.0.113.10" })).toBe("127.0.0.1");
    process.env.SLACKWATER_PROXY_COUNT = "1";
    expect(await answer({ "x-forwarded-for": "203.0.113.9, 203.0.113.10" })).toBe("203.0.113.10");
    delete process.env.SLACKWATER_PROXY_COUNT;
    await new Promise((resume) => server.close(resume));
  });
});
