CREATE TABLE "study_comment" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"study_id" uuid NOT NULL,
	"person_id" uuid NOT NULL,
	"text" text NOT NULL,
	"choice" integer,
	"separation_nm" double precision,
	"created_at" timestamp with time zone NOT NULL,
	"resolved_at" timestamp with time zone,
	"resolved_by" uuid,
	CONSTRAINT "study_comment_given" CHECK (length(trim("study_comment"."text")) between 1 and 4000),
	CONSTRAINT "study_comment_choice_range" CHECK ("study_comment"."choice" between 0 and 4),
	CONSTRAINT "study_comment_separation_range" CHECK ("study_comment"."separation_nm" > 0 and "study_comment"."separation_nm" < 'Infinity'),
	CONSTRAINT "study_comment_resolved_whole" CHECK (num_nonnulls("study_comment"."resolved_at", "study_comment"."resolved_by") in (0, 2))
);
--> statement-breakpoint
ALTER TABLE "study_comment" ADD CONSTRAINT "study_comment_study_id_study_id_fk" FOREIGN KEY ("study_id") REFERENCES "public"."study"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "study_comment" ADD CONSTRAINT "study_comment_person_id_person_id_fk" FOREIGN KEY ("person_id") REFERENCES "public"."person"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "study_comment" ADD CONSTRAINT "study_comment_resolved_by_person_id_fk" FOREIGN KEY ("resolved_by") REFERENCES "public"."person"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
CREATE INDEX "study_comment_study_index" ON "study_comment" USING btree ("study_id","created_at");--> statement-breakpoint
do $$
begin
	if exists (select from pg_roles where rolname = 'hairsbreadth_app') then
		grant select, insert, update, delete on study_comment to hairsbreadth_app;
	end if;
end $$;
--> statement-breakpoint

-- What was said stays as it was said; it can be marked as settled, once. With a private study of a deleted account it goes.
create function study_comment_guard() returns trigger language plpgsql as $$
begin
	if tg_op = 'DELETE' then
		if exists (select from study join person on person.id = study.owner_id
			where study.id = old.study_id and study.visibility = 'private' and person.state = 'deleted') then
			return old;
		end if;
	elsif (new.id, new.study_id, new.person_id, new.text, new.choice, new.separation_nm, new.created_at) is not distinct from
		(old.id, old.study_id, old.person_id, old.text, old.choice, old.separation_nm, old.created_at)
		and old.resolved_at is null then
		return new;
	end if;
	raise exception 'A comment stays as it was written.'
		using errcode = 'restrict_violation', constraint = 'study_comment_permanent';
end $$;
--> statement-breakpoint
create trigger study_comment_guard before update or delete on study_comment
	for each row execute function study_comment_guard();
--> statement-breakpoint
create constraint trigger study_comment_change_audited after insert or update on study_comment
	deferrable initially deferred for each row execute function change_audited('comment', 'id');
