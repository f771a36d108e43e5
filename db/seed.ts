import { pathToFileURL } from "node:url";
import { sql } from "drizzle-orm";
import { DEMO_ACCOUNTS, DEMO_PASSWORD, DEMO_WORKSPACES, type DemoAccount } from "@/lib/access/demo-accounts";
import { parseScenario, type ScenarioDocument } from "@/lib/scenario/schema";
import { TEMPLATES, templateById, type Template } from "@/lib/scenario/templates";
import { hashPassword } from "@/lib/server/passwords";
import { summarise } from "@/lib/server/summary";
import { hashToken } from "@/lib/server/tokens";
import { connect, type RootDatabase } from "./client";
import { scenarios, type RunSummary } from "./schema/index";
import { demoKey, demoShareToken } from "./demo/keys";
import { EXTRAS, LINKS, PLAIN_STORY, STORIES, type Story } from "./demo/stories";

/**
 * The demo: a waterworks team with people in every role, a second team, scenarios with histories, links of every kind. Also
 * what the browser tests start from. Seeding again adds what is new and changes nothing else.
 */
export async function seedDatabase(ownerUrl: string): Promise<"seeded" | "left alone"> {
  const { db, close } = connect(ownerUrl, 1);
  try {
    const [known] = await db.execute<{ people: number; demo: number }>(sql`
      select count(*)::int as people, (count(*) filter (where id = ${demoKey(DEMO_ACCOUNTS[0].email)}))::int as demo from users`);
    // a database that other people work in does not get accounts with a published password
    if (known!.people > 0 && known!.demo === 0) return "left alone";
    await addPeople(db);
    for (const [index, template] of TEMPLATES.entries()) {
      await addScenario(db, {
        key: `template ${template.id}`,
        title: template.title,
        template,
        story: STORIES[template.id] ?? PLAIN_STORY,
        hoursAgo: 5 + 17 * index,
      });
    }
    for (const [index, { title, templateId, isCopy, story }] of EXTRAS.entries()) {
      const template = templateById(templateId);
      if (!template) throw new Error(`the demo tells of a template that does not exist: ${templateId}`);
      await addScenario(db, {
        key: `extra ${title}`,
        title,
        template,
        story,
        hoursAgo: 30 + 41 * index,
        copiedFrom: isCopy ? `template ${templateId}` : undefined,
      });
    }
    await addLinks(db);
    return "seeded";
  } finally {
    await close();
  }
}

async function addPeople(db: RootDatabase): Promise<void> {
  for (const [name, title] of Object.entries(DEMO_WORKSPACES)) {
    await db.execute(sql`insert into workspaces (id, name) values (${demoKey(name)}, ${title}) on conflict do nothing`);
  }
  for (const account of DEMO_ACCOUNTS) {
    const userId = demoKey(account.email);
    const added = await db.execute(
      sql`insert into users (id, email, name) values (${userId}, ${account.email}, ${account.name}) on conflict do nothing returning id`,
    );
    if (added.length === 0) continue;
    await db.execute(
      sql`insert into credentials (user_id, password_hash) values (${userId}, ${await hashPassword(DEMO_PASSWORD)})`,
    );
    const memberships = [
      { workspace: account.workspace, role: account.role },
      ...("alsoIn" in account ? [account.alsoIn] : []),
    ];
    for (const [order, { workspace, role }] of memberships.entries()) {
      await db.execute(sql`
        insert into memberships (workspace_id, user_id, role, created_at) values (${demoKey(workspace)}, ${userId}, ${role}, now() + make_interval(secs => ${order}))`);
    }
  }
}

type Plan = { key: string; title: string; template: Template; story: Story; hoursAgo: number; copiedFrom?: string };

async function addScenario(
  db: RootDatabase,
  { key, title, template, story, hoursAgo, copiedFrom }: Plan,
): Promise<void> {
  const id = demoKey(key);
  const known = await db.execute(sql`select from scenarios where id = ${id}`);
  if (known.length > 0) return;

  const final = { ...template.document, title };
  const steps = [
    ...story.steps,
    { author: story.owner, message: story.finalMessage, edit: (same: ScenarioDocument) => same },
  ];
  const revisions: {
    number: number;
    author: DemoAccount;
    message: string;
    document: ScenarioDocument;
    summary: RunSummary | null;
    hoursAgo: number;
  }[] = [];
  for (const [index, step] of steps.entries()) {
    const checked = requireValid(step.edit(final), `${title}, revision ${index + 1}`);
    const author = DEMO_ACCOUNTS.find((account) => account.email === step.author)!;
    // each revision some working days before the next
    revisions.push({
      number: index + 1,
      author,
      message: step.message,
      document: checked,
      summary: await summarise(checked),
      hoursAgo: hoursAgo + 53 * (steps.length - 1 - index),
    });
  }
  const newest = revisions.length;
  const approved = story.state === "approved" ? newest : (story.approvedNumber ?? null);
  const ago = (hours: number) => sql`now() - make_interval(hours => ${hours})`;
  const workspaceId = demoKey(story.workspace);
  await db.transaction(async (tx) => {
    await tx.execute(sql`
      insert into scenarios (id, workspace_id, owner_id, copied_from_id, title, tags, state, newest_number, approved_number, archived_at, created_at, changed_at)
      values (${id}, ${workspaceId}, ${demoKey(story.owner)}, ${copiedFrom === undefined ? null : demoKey(copiedFrom)}, ${title}, ${sql.param([...template.tags], scenarios.tags)},
        ${story.state}, ${newest}, ${approved}, ${story.isArchived ? ago(hoursAgo - 1) : null}, ${ago(revisions[0]!.hoursAgo)}, ${ago(hoursAgo)})`);
    for (const revision of revisions) {
      const summary = revision.summary === null ? null : JSON.stringify(revision.summary);
      await tx.execute(sql`
        insert into revisions (workspace_id, scenario_id, number, document, author_id, author_name, message, summary, created_at)
        values (${workspaceId}, ${id}, ${revision.number}, ${JSON.stringify(revision.document)}::jsonb, ${demoKey(revision.author.email)}, ${revision.author.name}, ${revision.message}, ${summary}::jsonb, ${ago(revision.hoursAgo)})`);
    }
    const owner = DEMO_ACCOUNTS.find((account) => account.email === story.owner)!;
    await tx.execute(sql`
      insert into audit (workspace_id, actor_id, actor_name, deed, thing_id, detail, correlation_id, created_at)
      values (${workspaceId}, ${demoKey(owner.email)}, ${owner.name}, 'scenario.create', ${id}, ${JSON.stringify({ title })}::jsonb, 'demo', ${ago(revisions[0]!.hoursAgo)})`);
  });
}

function requireValid(document: ScenarioDocument, what: string): ScenarioDocument {
  const parsed = parseScenario(document);
  if (!parsed.ok)
    throw new Error(
      `${what} is not a valid scenario: ${parsed.findings.map((finding) => `${finding.path}: ${finding.text}`).join("; ")}`,
    );
  return parsed.document;
}

async function addLinks(db: RootDatabase): Promise<void> {
  const [first] = TEMPLATES;
  if (!first) return;
  const scenarioId = demoKey(`template ${first.id}`);
  for (const link of LINKS) {
    const expiresAt = link.name === "expired" ? sql`now() - interval '20 days'` : null;
    const revokedAt = link.name === "revoked" ? sql`now() - interval '2 days'` : null;
    await db.execute(sql`
      insert into share_links (id, workspace_id, scenario_id, token_hash, label, revision_number, maker_id, created_at, expires_at, revoked_at)
      select ${demoKey(`link ${link.name}`)}, workspace_id, id, ${hashToken(demoShareToken(link.name))}, ${link.label}, ${link.follows === "pinned" ? sql`approved_number` : null}, owner_id,
        now() - interval '40 days', ${expiresAt}, ${revokedAt}
      from scenarios where id = ${scenarioId}
      on conflict do nothing`);
  }
}

if (process.argv[1] && import.meta.url === pathToFileURL(process.argv[1]).href) {
  const { DATABASE_OWNER_URL } = process.env;
  if (!DATABASE_OWNER_URL)
    throw new Error("DATABASE_OWNER_URL must be set: the seed writes as the owner of the tables");
  const outcome = await seedDatabase(DATABASE_OWNER_URL);
  console.log(outcome === "seeded" ? "demo data is in place" : "other people work in this database: no demo data");
}
