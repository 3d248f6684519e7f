-- Invariants that a constraint cannot say. Each raises with a constraint name, so that the application can tell them apart.

-- Audit: append-only and hash-chained ------------------------------------------------------------------------------

create function audit_entry_hash(entry audit_entry) returns text
language sql stable
return encode(sha256(convert_to(jsonb_build_array(
	entry.id,
	to_char(entry.at at time zone 'UTC', 'YYYY-MM-DD"T"HH24:MI:SS.US"Z"'),
	entry.actor, entry.action, entry.object_type, entry.object_id, entry.from_state, entry.to_state,
	entry.details, entry.transaction_id, entry.previous_hash
)::text, 'UTF8')), 'hex');
--> statement-breakpoint
create function audit_entry_seal() returns trigger language plpgsql as $$
declare
	last record;
begin
	-- One writer at a time until its transaction ends: the chain has no forks and no gaps.
	perform pg_advisory_xact_lock(7241866102);
	select id, hash into last from audit_entry order by id desc limit 1;
	new.id := coalesce(last.id, 0) + 1;
	new.previous_hash := coalesce(last.hash, 'beginning');
	new.at := clock_timestamp();
	new.transaction_id := pg_current_xact_id()::text::bigint;
	new.details := coalesce(new.details, '{}'::jsonb);
	new.hash := audit_entry_hash(new);
	return new;
end $$;
--> statement-breakpoint
create trigger audit_entry_seal before insert on audit_entry for each row execute function audit_entry_seal();
--> statement-breakpoint
create function audit_entry_refuse() returns trigger language plpgsql as $$
begin
	raise exception 'The audit trail is append-only: % refused.', lower(tg_op)
		using errcode = 'restrict_violation', constraint = 'audit_entry_append_only';
end $$;
--> statement-breakpoint
create trigger audit_entry_refuse_change before update or delete on audit_entry
	for each row execute function audit_entry_refuse();
--> statement-breakpoint
create trigger audit_entry_refuse_truncate before truncate on audit_entry
	for each statement execute function audit_entry_refuse();
--> statement-breakpoint
-- The first entry whose seal or link does not fit, or null.
create function audit_chain_break() returns bigint language sql stable as $$
	select id from (
		select entry.id, entry.hash = audit_entry_hash(entry) as sealed,
			entry.previous_hash = coalesce(lag(entry.hash) over (order by entry.id), 'beginning') as linked,
			entry.id = row_number() over (order by entry.id) as counted
		from audit_entry as entry
	) as chain
	where not (sealed and linked and counted)
	order by id limit 1
$$;
--> statement-breakpoint

-- Versions: what left draft never changes, and states move along the drawn graph only -------------------------------

create function version_begin_as_draft() returns trigger language plpgsql as $$
begin
	if new.state <> 'draft' or num_nonnulls(new.submitted_at, new.submitted_by, new.published_at, new.published_by,
		new.withdrawn_at, new.withdrawn_by, new.withdrawn_reason) > 0 then
		raise exception 'A version begins as a draft.'
			using errcode = 'check_violation', constraint = 'version_begins_as_draft';
	end if;
	return new;
end $$;
--> statement-breakpoint
create trigger version_begin_as_draft before insert on version for each row execute function version_begin_as_draft();
--> statement-breakpoint
create function version_guard() returns trigger language plpgsql as $$
declare
	content version;
	step text := old.state || ' -> ' || new.state;
begin
	if old.id <> new.id then
		raise exception 'The identity of a version never changes.'
			using errcode = 'restrict_violation', constraint = 'version_immutable';
	end if;
	if old.state = 'draft' and new.state = 'draft' then
		return new;
	end if;
	if old.state <> new.state and step not in
		('draft -> in_review', 'in_review -> draft', 'in_review -> published', 'published -> withdrawn') then
		raise exception 'A version cannot go from % to %.', old.state, new.state
			using errcode = 'check_violation', constraint = 'version_state_graph';
	end if;

	-- Everything but what the step itself writes must be the same image. A column added later is guarded too.
	content := new;
	if old.state <> new.state then
		content.state := old.state;
		case step
			when 'draft -> in_review' then
				content.submitted_at := old.submitted_at;
				content.submitted_by := old.submitted_by;
			when 'in_review -> draft' then
				content.submitted_at := old.submitted_at;
				content.submitted_by := old.submitted_by;
			when 'in_review -> published' then
				content.published_at := old.published_at;
				content.published_by := old.published_by;
			else
				content.withdrawn_at := old.withdrawn_at;
				content.withdrawn_by := old.withdrawn_by;
				content.withdrawn_reason := old.withdrawn_reason;
		end case;
	end if;
	if content *<> old then
		raise exception 'Version % of its dataset is % and never changes; make a new version.',
			old.major || '.' || old.minor, replace(old.state, '_', ' ')
			using errcode = 'restrict_violation', constraint = 'version_immutable';
	end if;

	if step = 'draft -> in_review' then
		if new.submitted_at is null or new.submitted_by is null then
			raise exception 'A submission names its time and person.'
				using errcode = 'check_violation', constraint = 'version_submission_complete';
		end if;
		if not exists (select from version_source where version_id = new.id) then
			raise exception 'A version without a source cannot be submitted.'
				using errcode = 'check_violation', constraint = 'version_submission_sourced';
		end if;
		if not exists (select from check_result where version_id = new.id) or exists (
			select from check_result where version_id = new.id
				and (severity = 'fail' or (severity = 'warn' and length(trim(coalesce(answer, ''))) = 0))
		) then
			raise exception 'A version is submitted with its checks passed and every warning answered.'
				using errcode = 'check_violation', constraint = 'version_submission_checked';
		end if;
	end if;
	return new;
end $$;
--> statement-breakpoint
create trigger version_guard before update on version for each row execute function version_guard();
--> statement-breakpoint
create function version_keep() returns trigger language plpgsql as $$
begin
	if tg_op = 'TRUNCATE' or old.state <> 'draft' then
		raise exception 'A version that has left draft stays reachable forever.'
			using errcode = 'restrict_violation', constraint = 'version_kept';
	end if;
	return old;
end $$;
--> statement-breakpoint
create trigger version_keep before delete on version for each row execute function version_keep();
--> statement-breakpoint
create trigger version_keep_from_truncate before truncate on version
	for each statement execute function version_keep();
--> statement-breakpoint

-- Sources and checks belong to the version's content.
create function version_part_guard() returns trigger language plpgsql as $$
declare
	touched uuid[] := case tg_op
		when 'INSERT' then array[new.version_id]
		when 'DELETE' then array[old.version_id]
		else array[old.version_id, new.version_id]
	end;
begin
	-- The row lock orders this change against a submission under way.
	perform from version where id = any (touched) for share;
	if exists (select from version where id = any (touched) and state <> 'draft') then
		raise exception 'The % of a version that has left draft never change.', replace(tg_table_name, '_', ' ')
			using errcode = 'restrict_violation', constraint = 'version_immutable';
	end if;
	return case tg_op when 'DELETE' then old else new end;
end $$;
--> statement-breakpoint
create trigger version_source_guard before insert or update or delete on version_source
	for each row execute function version_part_guard();
--> statement-breakpoint
create trigger check_result_guard before insert or update or delete on check_result
	for each row execute function version_part_guard();
--> statement-breakpoint
create function refuse_truncate() returns trigger language plpgsql as $$
begin
	raise exception 'The library is never emptied.'
		using errcode = 'restrict_violation', constraint = 'version_kept';
end $$;
--> statement-breakpoint
create trigger version_source_keep before truncate on version_source for each statement execute function refuse_truncate();
--> statement-breakpoint
create trigger check_result_keep before truncate on check_result for each statement execute function refuse_truncate();
--> statement-breakpoint

-- No state without its audit row in the same transaction. Deferred, so that the two may be written in either order.
create function version_transition_audited() returns trigger language plpgsql as $$
declare
	came_from text := case tg_op when 'INSERT' then null else old.state end;
begin
	if not exists (
		select from audit_entry
		where object_type = 'version' and object_id = new.id::text
			and to_state = new.state and from_state is not distinct from came_from
			and transaction_id = pg_current_xact_id()::text::bigint
	) then
		raise exception 'A version became % without an audit row in the same transaction.', new.state
			using errcode = 'check_violation', constraint = 'version_transition_audited';
	end if;
	return null;
end $$;
--> statement-breakpoint
create constraint trigger version_creation_audited after insert on version
	deferrable initially deferred for each row execute function version_transition_audited();
--> statement-breakpoint
create constraint trigger version_transition_audited after update on version
	deferrable initially deferred for each row when (old.state is distinct from new.state)
	execute function version_transition_audited();
--> statement-breakpoint

-- Addresses are permanent ------------------------------------------------------------------------------------------

create function slug_is_permanent() returns trigger language plpgsql as $$
begin
	if new.slug <> old.slug or new.id <> old.id then
		raise exception 'The address of a % is permanent.', tg_table_name
			using errcode = 'restrict_violation', constraint = 'slug_permanent';
	end if;
	return new;
end $$;
--> statement-breakpoint
create trigger material_slug_permanent before update on material for each row execute function slug_is_permanent();
--> statement-breakpoint
create trigger source_slug_permanent before update on source for each row execute function slug_is_permanent();
--> statement-breakpoint
create trigger dataset_slug_permanent before update on dataset for each row execute function slug_is_permanent();
--> statement-breakpoint
create function dataset_material_permanent() returns trigger language plpgsql as $$
begin
	if new.material_id <> old.material_id and exists (
		select from version where dataset_id = old.id and state <> 'draft'
	) then
		raise exception 'A dataset with versions under review or published stays with its material.'
			using errcode = 'restrict_violation', constraint = 'dataset_material_permanent';
	end if;
	return new;
end $$;
--> statement-breakpoint
create trigger dataset_material_permanent before update on dataset
	for each row execute function dataset_material_permanent();
--> statement-breakpoint

-- The application's own role may add to the audit trail and read it, no more. Absent where a deployment has one role only.
do $$
begin
	if exists (select from pg_roles where rolname = 'hairsbreadth_app') then
		revoke update, delete, truncate on audit_entry from hairsbreadth_app;
		revoke truncate on version, version_source, check_result from hairsbreadth_app;
		grant select, insert on audit_entry to hairsbreadth_app;
		grant select, insert, update, delete on
			material, source, dataset, version, version_source, check_result, setting to hairsbreadth_app;
	end if;
end $$;
