-- What a person, a group or a token is allowed to do never changes without a row of the audit trail in the same transaction.
-- Arguments: the type of the object, then the columns that name it. Deferred, so that the two may be written in either order.
create function change_audited() returns trigger language plpgsql as $$
declare
	changed jsonb := case tg_op when 'DELETE' then to_jsonb(old) else to_jsonb(new) end;
	named text := changed ->> tg_argv[1];
begin
	if tg_nargs > 2 then
		named := named || '/' || (changed ->> tg_argv[2]);
	end if;
	if not exists (
		select from audit_entry
		where object_type = tg_argv[0] and object_id = named
			and transaction_id = pg_current_xact_id()::text::bigint
	) then
		raise exception 'A % changed (%) without an audit row in the same transaction.', tg_argv[0], lower(tg_op)
			using errcode = 'check_violation', constraint = tg_table_name || '_change_audited';
	end if;
	return null;
end $$;
--> statement-breakpoint
create constraint trigger person_change_audited after insert or update or delete on person
	deferrable initially deferred for each row execute function change_audited('person', 'id');
--> statement-breakpoint
create constraint trigger account_link_change_audited after insert or update or delete on account_link
	deferrable initially deferred for each row execute function change_audited('person', 'person_id');
--> statement-breakpoint
create constraint trigger group_change_audited after insert or update or delete on "group"
	deferrable initially deferred for each row execute function change_audited('group', 'id');
--> statement-breakpoint
create constraint trigger membership_change_audited after insert or update or delete on membership
	deferrable initially deferred for each row execute function change_audited('membership', 'group_id', 'person_id');
--> statement-breakpoint
create constraint trigger invitation_change_audited after insert or update or delete on invitation
	deferrable initially deferred for each row execute function change_audited('invitation', 'id');
--> statement-breakpoint
create constraint trigger session_change_audited after insert or delete on session
	deferrable initially deferred for each row execute function change_audited('session', 'id');
--> statement-breakpoint
create constraint trigger api_token_change_audited after insert or delete on api_token
	deferrable initially deferred for each row execute function change_audited('token', 'id');
--> statement-breakpoint
create constraint trigger api_token_revocation_audited after update on api_token
	deferrable initially deferred for each row
	when ((old.revoked_at, old.scopes, old.expires_at, old.person_id) is distinct from
		(new.revoked_at, new.scopes, new.expires_at, new.person_id))
	execute function change_audited('token', 'id');
--> statement-breakpoint

-- What was decided once stays decided.
create function person_guard() returns trigger language plpgsql as $$
begin
	if tg_op <> 'UPDATE' then
		raise exception 'An account is never deleted as a row: others go on naming it.'
			using errcode = 'restrict_violation', constraint = 'person_kept';
	end if;
	if new.id <> old.id or (old.state = 'deleted' and new *<> old) then
		raise exception 'A deleted account stays as it is.'
			using errcode = 'restrict_violation', constraint = 'person_deleted_for_good';
	end if;
	return new;
end $$;
--> statement-breakpoint
create trigger person_guard before update or delete on person for each row execute function person_guard();
--> statement-breakpoint
create function token_guard() returns trigger language plpgsql as $$
begin
	if new.secret_hash <> old.secret_hash or new.person_id <> old.person_id or new.created_at <> old.created_at
		or not new.scopes <@ old.scopes or new.expires_at > old.expires_at
		or (old.revoked_at is not null and new.revoked_at is distinct from old.revoked_at) then
		raise exception 'A token can only lose what it may do.'
			using errcode = 'restrict_violation', constraint = 'api_token_only_loses';
	end if;
	return new;
end $$;
--> statement-breakpoint
create trigger api_token_guard before update on api_token for each row execute function token_guard();
--> statement-breakpoint
create function invitation_guard() returns trigger language plpgsql as $$
begin
	if (new.id, new.secret_hash, new.email, new.role, new.group_id, new.lead, new.invited_by, new.created_at) is distinct from
		(old.id, old.secret_hash, old.email, old.role, old.group_id, old.lead, old.invited_by, old.created_at)
		or new.expires_at > old.expires_at or num_nonnulls(old.accepted_at, old.revoked_at) > 0 then
		raise exception 'An invitation is answered or taken back once and never rewritten.'
			using errcode = 'restrict_violation', constraint = 'invitation_permanent';
	end if;
	return new;
end $$;
--> statement-breakpoint
create trigger invitation_guard before update on invitation for each row execute function invitation_guard();
--> statement-breakpoint
create trigger group_slug_permanent before update on "group" for each row execute function slug_is_permanent();
--> statement-breakpoint

-- An installation without an administrator could not be repaired from its own pages.
create function administrator_left() returns trigger language plpgsql as $$
begin
	if not exists (select from person where role = 'administrator' and state = 'active') then
		raise exception 'At least one active administrator must be left.'
			using errcode = 'check_violation', constraint = 'person_administrator_left';
	end if;
	return null;
end $$;
--> statement-breakpoint
create constraint trigger person_administrator_left after update on person
	deferrable initially deferred for each row
	when (old.role = 'administrator' and old.state = 'active' and (new.role <> 'administrator' or new.state <> 'active'))
	execute function administrator_left();
