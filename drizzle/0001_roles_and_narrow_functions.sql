-- Two roles without login. `slackwater_app` holds what the application may do; the login role of DATABASE_URL is made a
-- member of it by db/migrate.ts. `slackwater_definer` owns the few functions that must look past row-level security, and
-- has rights on exactly what those functions read and write. Roles belong to the cluster: another database may have made them.
do $$
begin
  if not exists (select from pg_roles where rolname = 'slackwater_app') then
    create role slackwater_app nologin nosuperuser nocreatedb nocreaterole nobypassrls;
  end if;
  if not exists (select from pg_roles where rolname = 'slackwater_definer') then
    create role slackwater_definer nologin nosuperuser nocreatedb nocreaterole nobypassrls;
  end if;
  -- an owner that is no superuser must be a member to hand functions over
  if not (select rolsuper from pg_roles where rolname = current_user) then
    execute format('grant slackwater_definer to %I', current_user);
  end if;
end
$$;

create schema app;
revoke all on schema public from public;
grant usage on schema public, app to slackwater_app, slackwater_definer;

-- The actor, as db/client.ts withScope set it for this transaction; null when nobody is acting.
create function app.user_id() returns uuid language sql stable set search_path = ''
  as $$ select nullif(current_setting('app.user_id', true), '')::uuid $$;
create function app.workspace_id() returns uuid language sql stable set search_path = ''
  as $$ select nullif(current_setting('app.workspace_id', true), '')::uuid $$;

-- The actor's role in a workspace; null for a stranger. Past row-level security, because the policies of memberships ask it.
create function app.role_in(p_workspace_id uuid) returns public.member_role language sql stable security definer set search_path = ''
  as $$ select role from public.memberships where workspace_id = p_workspace_id and user_id = app.user_id() $$;
create function app.role_here() returns public.member_role language sql stable set search_path = ''
  as $$ select app.role_in(app.workspace_id()) $$;

-- May the actor, if a student, copy this scenario: it is approved and not archived, or the actor's own.
create function app.is_open_to_student(p_scenario_id uuid) returns boolean language sql stable security definer set search_path = ''
  as $$
    select exists (
      select from public.scenarios
      where id = p_scenario_id and workspace_id = app.workspace_id()
        and (owner_id = app.user_id() or (approved_number is not null and archived_at is null)))
  $$;

-- Sign-in: the hash for one e-mail, nothing else, one row at most.
create function app.find_credential(p_email text) returns table (user_id uuid, user_name text, password_hash text)
  language sql stable security definer set search_path = ''
  as $$
    select u.id, u.name, c.password_hash
    from public.users u join public.credentials c on c.user_id = u.id
    where u.email = lower(p_email)
  $$;

-- Each request: who holds this session, if it is neither revoked nor expired. Notes the visit at most once a minute.
create function app.touch_session(p_token_hash text) returns table (session_id uuid, user_id uuid, user_name text, user_email text)
  language plpgsql volatile security definer set search_path = ''
  as $$
    begin
      update public.sessions s set last_seen_at = now()
      where s.token_hash = p_token_hash and s.revoked_at is null and s.expires_at > now() and s.last_seen_at < now() - interval '1 minute';
      return query
        select s.id, u.id, u.name, u.email
        from public.sessions s join public.users u on u.id = s.user_id
        where s.token_hash = p_token_hash and s.revoked_at is null and s.expires_at > now();
    end
  $$;

-- Signing out: ends the session that this token belongs to.
create function app.end_session(p_token_hash text) returns void
  language sql volatile security definer set search_path = ''
  as $$ update public.sessions set revoked_at = now() where token_hash = p_token_hash and revoked_at is null $$;

-- A share link: what it names and no more, and one opening counted. `status` says why there is nothing otherwise.
create function app.open_share_link(p_token_hash text)
  returns table (status text, title text, document jsonb, revision_number integer, label text, follows text, workspace_name text)
  language plpgsql volatile security definer set search_path = ''
  as $$
    declare
      link public.share_links;
    begin
      select * into link from public.share_links l where l.token_hash = p_token_hash for update;
      if not found then
        return query select 'unknown', null::text, null::jsonb, null::integer, null::text, null::text, null::text;
      elsif link.revoked_at is not null then
        return query select 'revoked', null::text, null::jsonb, null::integer, null::text, null::text, null::text;
      elsif link.expires_at <= now() then
        return query select 'expired', null::text, null::jsonb, null::integer, null::text, null::text, null::text;
      else
        update public.share_links l set opened_count = l.opened_count + 1, last_opened_at = now() where l.id = link.id;
        return query
          select 'open', s.title, r.document, r.number, link.label, case when link.revision_number is null then 'newest' else 'pinned' end, w.name
          from public.scenarios s
          join public.revisions r on r.scenario_id = s.id and r.number = coalesce(link.revision_number, s.newest_number)
          join public.workspaces w on w.id = s.workspace_id
          where s.id = link.scenario_id;
      end if;
    end
  $$;

-- Counts an attempt in a sliding window (this window's count, plus the part of the last one's that still reaches in) and says
-- whether it is within the limit. A refused attempt is not counted, so trying on does not lengthen the wait.
create function app.count_attempt(p_key text, p_window_s integer, p_limit integer) returns table (is_allowed boolean, retry_after_s integer)
  language plpgsql volatile security definer set search_path = ''
  as $$
    declare
      v_now double precision := extract(epoch from clock_timestamp());
      v_start double precision := floor(v_now / p_window_s) * p_window_s;
      v_elapsed double precision := (v_now - v_start) / p_window_s;
      v_here integer;
      v_before integer;
      v_is_allowed boolean;
    begin
      insert into public.rate_limits as r (key, window_start, attempt_count, stale_at)
      values (p_key, to_timestamp(v_start), 1, to_timestamp(v_start + 2 * p_window_s))
      on conflict (key, window_start) do update set attempt_count = r.attempt_count + 1
      returning r.attempt_count into v_here;
      select coalesce(sum(r.attempt_count), 0) into v_before from public.rate_limits r
      where r.key = p_key and r.window_start = to_timestamp(v_start - p_window_s);
      v_is_allowed := v_here + v_before * (1 - v_elapsed) <= p_limit;
      if not v_is_allowed then
        update public.rate_limits r set attempt_count = r.attempt_count - 1 where r.key = p_key and r.window_start = to_timestamp(v_start);
      end if;
      -- one call in a hundred sweeps what no longer counts
      if random() < 0.01 then
        delete from public.rate_limits r where r.stale_at < clock_timestamp();
      end if;
      return query select v_is_allowed, greatest(1, ceil(v_start + p_window_s - v_now))::integer;
    end
  $$;

-- Gives an attempt back: a sign-in that succeeded was no attack.
create function app.return_attempt(p_key text, p_window_s integer) returns void
  language sql volatile security definer set search_path = ''
  as $$
    update public.rate_limits set attempt_count = greatest(0, attempt_count - 1)
    where key = p_key and window_start = to_timestamp(floor(extract(epoch from clock_timestamp()) / p_window_s) * p_window_s)
  $$;

-- Only the application calls them; those that look past row-level security belong to the narrow role.
grant create on schema app to slackwater_definer;
do $$
declare
  f regprocedure;
begin
  for f in select p.oid::regprocedure from pg_proc p where p.pronamespace = 'app'::regnamespace loop
    execute format('revoke all on function %s from public', f);
    execute format('grant execute on function %s to slackwater_app, slackwater_definer', f);
    if (select prosecdef from pg_proc where oid = f) then
      execute format('alter function %s owner to slackwater_definer', f);
    end if;
  end loop;
end
$$;
revoke create on schema app from slackwater_definer;
