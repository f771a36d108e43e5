-- Rights, column by column, and row-level security on every table that holds people's or a workspace's data. The rules are
-- those of lib/access/table.ts; tests/integration/roles.test.ts holds both together.

-- ------------------------------------------------------------------ rights
grant select on users, workspaces, memberships, scenarios, revisions, kept_drafts, audit to slackwater_app;
-- no right at all on credentials and rate_limits; never a right to read a token hash
grant select (id, user_id, user_agent, address, created_at, last_seen_at, expires_at, revoked_at) on sessions to slackwater_app;
grant insert (user_id, token_hash, user_agent, address, expires_at), update (revoked_at) on sessions to slackwater_app;
grant insert (id, workspace_id, owner_id, copied_from_id, title, tags, newest_number) on scenarios to slackwater_app;
grant update (title, tags, state, newest_number, archived_at, changed_at) on scenarios to slackwater_app;
grant insert (workspace_id, scenario_id, number, document, author_id, author_name, message, summary) on revisions to slackwater_app;
grant insert (workspace_id, scenario_id, author_id, base_number, document, message), update (kept_as_number) on kept_drafts to slackwater_app;
grant select (id, workspace_id, scenario_id, label, revision_number, maker_id, created_at, expires_at, revoked_at, opened_count, last_opened_at) on share_links to slackwater_app;
grant insert (workspace_id, scenario_id, token_hash, label, revision_number, maker_id, expires_at), update (expires_at, revoked_at) on share_links to slackwater_app;
grant insert (workspace_id, actor_id, actor_name, deed, thing_id, detail, correlation_id) on audit to slackwater_app;

grant select on users, credentials, sessions, memberships, workspaces, scenarios, revisions, share_links to slackwater_definer;
grant update (last_seen_at, revoked_at) on sessions to slackwater_definer;
grant update (opened_count, last_opened_at) on share_links to slackwater_definer;
grant select, insert, update, delete on rate_limits to slackwater_definer;

-- ------------------------------------------------------------------ switched on, for the owner too
do $$
declare
  t text;
begin
  foreach t in array array['users', 'credentials', 'sessions', 'workspaces', 'memberships', 'scenarios', 'revisions', 'kept_drafts', 'share_links', 'audit', 'rate_limits'] loop
    execute format('alter table public.%I enable row level security', t);
    execute format('alter table public.%I force row level security', t);
    -- migrations and the seed
    execute format('create policy owner_maintains on public.%I to current_user using (true) with check (true)', t);
  end loop;
  foreach t in array array['users', 'credentials', 'sessions', 'workspaces', 'memberships', 'scenarios', 'revisions', 'share_links'] loop
    execute format('create policy narrow_functions_read on public.%I for select to slackwater_definer using (true)', t);
  end loop;
  foreach t in array array['sessions', 'share_links'] loop
    execute format('create policy narrow_functions_note_visits on public.%I for update to slackwater_definer using (true)', t);
  end loop;
end
$$;
create policy narrow_functions_count on rate_limits to slackwater_definer using (true) with check (true);

-- ------------------------------------------------------------------ people
create policy person_reads_self_colleagues_and_owners on users for select to slackwater_app using (
  id = (select app.user_id())
  or exists (select from memberships m where m.user_id = users.id and m.workspace_id = (select app.workspace_id()))
  or exists (select from scenarios s where s.owner_id = users.id)
);
create policy person_reads_own_sessions on sessions for select to slackwater_app using (user_id = (select app.user_id()));
create policy person_starts_own_session on sessions for insert to slackwater_app with check (user_id = (select app.user_id()));
create policy person_ends_own_session on sessions for update to slackwater_app using (user_id = (select app.user_id())) with check (user_id = (select app.user_id()));

-- ------------------------------------------------------------------ workspaces
create policy member_reads_own_workspaces on workspaces for select to slackwater_app using (app.role_in(id) is not null);
create policy member_reads_members_student_only_self on memberships for select to slackwater_app using (
  user_id = (select app.user_id())
  or (workspace_id = (select app.workspace_id()) and (select app.role_here()) in ('admin', 'lead', 'designer', 'trainer'))
);

-- ------------------------------------------------------------------ scenarios
create policy staff_reads_all_student_reads_own_and_approved on scenarios for select to slackwater_app using (
  workspace_id = (select app.workspace_id())
  and (
    (select app.role_here()) in ('admin', 'lead', 'designer', 'trainer')
    or ((select app.role_here()) = 'student' and (owner_id = (select app.user_id()) or (approved_number is not null and archived_at is null)))
  )
);
create policy staff_makes_student_only_copies on scenarios for insert to slackwater_app with check (
  workspace_id = (select app.workspace_id())
  and owner_id = (select app.user_id())
  and (
    (select app.role_here()) in ('admin', 'lead', 'designer', 'trainer')
    or ((select app.role_here()) = 'student' and app.is_open_to_student(copied_from_id))
  )
);
create policy designer_edits_all_others_own on scenarios for update to slackwater_app using (
  workspace_id = (select app.workspace_id())
  and (
    (select app.role_here()) in ('admin', 'lead', 'designer')
    or ((select app.role_here()) in ('trainer', 'student') and owner_id = (select app.user_id()))
  )
);

create policy staff_reads_all_student_reads_own_and_approved on revisions for select to slackwater_app using (
  workspace_id = (select app.workspace_id())
  and (
    (select app.role_here()) in ('admin', 'lead', 'designer', 'trainer')
    or exists (select from scenarios s where s.id = revisions.scenario_id and (s.owner_id = (select app.user_id()) or s.approved_number = revisions.number))
  )
);
create policy designer_saves_all_others_own on revisions for insert to slackwater_app with check (
  workspace_id = (select app.workspace_id())
  and author_id = (select app.user_id())
  and (
    (select app.role_here()) in ('admin', 'lead', 'designer')
    or exists (select from scenarios s where s.id = revisions.scenario_id and s.owner_id = (select app.user_id()))
  )
);

create policy author_reads_own_drafts on kept_drafts for select to slackwater_app using (
  workspace_id = (select app.workspace_id()) and author_id = (select app.user_id()) and (select app.role_here()) is not null
);
create policy author_keeps_draft_where_saving_is_allowed on kept_drafts for insert to slackwater_app with check (
  workspace_id = (select app.workspace_id())
  and author_id = (select app.user_id())
  and (
    (select app.role_here()) in ('admin', 'lead', 'designer')
    or exists (select from scenarios s where s.id = kept_drafts.scenario_id and s.owner_id = (select app.user_id()))
  )
);
create policy author_marks_own_draft_kept on kept_drafts for update to slackwater_app using (
  workspace_id = (select app.workspace_id()) and author_id = (select app.user_id()) and (select app.role_here()) is not null
);

-- ------------------------------------------------------------------ links
create policy staff_reads_links on share_links for select to slackwater_app using (
  workspace_id = (select app.workspace_id()) and (select app.role_here()) in ('admin', 'lead', 'designer', 'trainer')
);
create policy staff_makes_links on share_links for insert to slackwater_app with check (
  workspace_id = (select app.workspace_id()) and maker_id = (select app.user_id()) and (select app.role_here()) in ('admin', 'lead', 'designer', 'trainer')
);
create policy designer_changes_all_links_trainer_own on share_links for update to slackwater_app using (
  workspace_id = (select app.workspace_id())
  and ((select app.role_here()) in ('admin', 'lead', 'designer') or ((select app.role_here()) = 'trainer' and maker_id = (select app.user_id())))
);

-- ------------------------------------------------------------------ audit
create policy admin_reads_audit on audit for select to slackwater_app using (
  workspace_id = (select app.workspace_id()) and (select app.role_here()) = 'admin'
);
create policy actor_adds_to_audit on audit for insert to slackwater_app with check (
  actor_id = (select app.user_id())
  and (workspace_id is null or (workspace_id = (select app.workspace_id()) and (select app.role_here()) is not null))
);
