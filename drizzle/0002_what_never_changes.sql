-- What must never change, refused to everyone, the owner of the tables included.
create function app.refuse_change() returns trigger language plpgsql set search_path = ''
  as $$
    begin
      raise exception '% is append-only: % refused', tg_table_name, tg_op using errcode = 'restrict_violation';
    end
  $$;

create trigger revisions_are_immutable before update or delete on revisions for each row execute function app.refuse_change();
create trigger revisions_are_not_truncated before truncate on revisions for each statement execute function app.refuse_change();
create trigger audit_is_append_only before update or delete on audit for each row execute function app.refuse_change();
create trigger audit_is_not_truncated before truncate on audit for each statement execute function app.refuse_change();

-- The newest revision of a scenario exists at the end of every transaction (checked then: each row names the other).
alter table scenarios add constraint scenarios_newest_exists
  foreign key (id, newest_number) references revisions (scenario_id, number) on delete no action deferrable initially deferred;
alter table scenarios add constraint scenarios_approved_exists
  foreign key (id, approved_number) references revisions (scenario_id, number) on delete no action deferrable initially deferred;

-- What column rights cannot say: revisions are counted one by one; only a draft comes of an edit (approving is another deed);
-- archiving is for admins, leads and the owner. Bound to people: migrations and the seed act for nobody.
create function app.guard_scenario_change() returns trigger language plpgsql set search_path = ''
  as $$
    begin
      if app.user_id() is null then
        return new;
      end if;
      if new.newest_number not in (old.newest_number, old.newest_number + 1) then
        raise exception 'revisions are counted one by one' using errcode = 'check_violation';
      end if;
      if new.state is distinct from old.state and new.state <> 'draft' then
        raise exception 'an edit leaves a draft' using errcode = 'insufficient_privilege';
      end if;
      if (new.archived_at is null) <> (old.archived_at is null) and old.owner_id <> app.user_id() and app.role_here() not in ('admin', 'lead') then
        raise exception 'archiving is for admins, leads and the owner' using errcode = 'insufficient_privilege';
      end if;
      return new;
    end
  $$;
create trigger scenarios_change_within_role before update on scenarios for each row execute function app.guard_scenario_change();

-- A withdrawn link stays withdrawn, and a link keeps what it names.
create function app.guard_link_change() returns trigger language plpgsql set search_path = ''
  as $$
    begin
      if old.revoked_at is not null and new.revoked_at is distinct from old.revoked_at then
        raise exception 'a revoked link stays revoked' using errcode = 'restrict_violation';
      end if;
      if (new.scenario_id, new.workspace_id, new.token_hash, new.maker_id) is distinct from (old.scenario_id, old.workspace_id, old.token_hash, old.maker_id)
        or new.revision_number is distinct from old.revision_number then
        raise exception 'a link keeps what it names' using errcode = 'restrict_violation';
      end if;
      return new;
    end
  $$;
create trigger share_links_keep_what_they_name before update on share_links for each row execute function app.guard_link_change();
