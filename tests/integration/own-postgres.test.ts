import { chmodSync, mkdtempSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import postgres from "postgres";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { findAnyPort } from "../../scripts/ports.mjs";
import { OWNER, databaseUrl, startPostgres } from "../../scripts/postgres.mjs";
import { isRunning, until } from "../../scripts/processes.mjs";

const password = "pass word/with:signs@";

describe("a PostgreSQL server of our own", () => {
  let base: string;
  let port: number;
  const start = (given = password) =>
    startPostgres({ folder: join(base, "postgres"), password: given, log: join(base, "log"), port });
  const ask = async <T>(question: (sql: postgres.Sql) => Promise<T>) => {
    const sql = postgres(databaseUrl({ port, user: OWNER, password, database: "postgres" }), { max: 1 });
    try {
      return await question(sql);
    } finally {
      await sql.end();
    }
  };
  let server: Awaited<ReturnType<typeof startPostgres>>;

  beforeAll(async () => {
    base = mkdtempSync(join(tmpdir(), "own-postgres-"));
    chmodSync(base, 0o711);
    port = Number(await findAnyPort());
    server = await start();
  });
  afterAll(async () => {
    await server.stop();
    rmSync(base, { recursive: true });
  });

  it("listens on the loopback address alone and lets nobody in without a password", async () => {
    const [settings] = await ask((sql) => sql`select current_setting('listen_addresses') as hosts, current_setting('unix_socket_directories') as sockets`);
    expect(settings).toEqual({ hosts: "127.0.0.1", sockets: "" });
    const methods = await ask((sql) => sql`select distinct type, auth_method from pg_hba_file_rules order by 1, 2`);
    expect(methods.map((row) => `${row.type} ${row.auth_method}`)).toEqual(["host scram-sha-256", "local reject"]);
  });

  it("is taken over, not started twice, by the next start while it runs", async () => {
    const again = await start();
    expect(again).toMatchObject({ pid: server.pid, port });
  });

  it("keeps what was written when it is killed outright and started again", async () => {
    await ask((sql) => sql`create table kept as select 4711 as value`);
    process.kill(server.pid, "SIGKILL");
    expect(await until(() => !isRunning(server.pid), 5_000)).toBe(true);
    const before = server.pid;
    server = await start();
    expect(server.pid).not.toBe(before);
    expect(await ask((sql) => sql`select value from kept`)).toMatchObject([{ value: 4711 }]);
  });

  it("a note of a server whose number now belongs to another process does not keep it from starting", async () => {
    await server.stop();
    writeFileSync(join(base, "postgres/postmaster.pid"), `${process.pid}\n${join(base, "postgres")}\n0\n${port}\n`);
    server = await start();
    expect(await ask((sql) => sql`select 1 as one`)).toMatchObject([{ one: 1 }]);
  });

  it("a password that does not belong to the files is named as the cause", async () => {
    await expect(start("another one")).rejects.toThrow("refuses the password");
    expect(isRunning(server.pid)).toBe(true);
  });

  it("leaves no process when stopped", async () => {
    await server.stop();
    expect(isRunning(server.pid)).toBe(false);
    server = await start();
  });
});
