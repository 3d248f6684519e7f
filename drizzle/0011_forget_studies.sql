-- With an account go its private studies and every state of them, and nothing else ever.
create or replace function study_change_refuse() returns trigger language plpgsql as $$
begin
	if tg_op = 'DELETE' and exists (
		select from study join person on person.id = study.owner_id
		where study.id = old.study_id and study.visibility = 'private' and person.state = 'deleted') then
		return old;
	end if;
	raise exception 'The states that a study went through never change.'
		using errcode = 'restrict_violation', constraint = 'study_change_append_only';
end $$;
--> statement-breakpoint
create function study_stays() returns trigger language plpgsql as $$
begin
	if old.visibility = 'private' and exists (select from person where id = old.owner_id and state = 'deleted') then
		return old;
	end if;
	raise exception 'A study is archived, not deleted.'
		using errcode = 'restrict_violation', constraint = 'study_stays';
end $$;
--> statement-breakpoint
create trigger study_stays before delete on study for each row execute function study_stays();
--> statement-breakpoint
do $$
begin
	if exists (select from pg_roles where rolname = 'hairsbreadth_app') then
		grant delete on study, study_change to hairsbreadth_app;
	end if;
end $$;
