CREATE TABLE "study" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"owner_id" uuid NOT NULL,
	"group_id" uuid,
	"visibility" text DEFAULT 'private' NOT NULL,
	"name" text NOT NULL,
	"query" text NOT NULL,
	"notes" text DEFAULT '' NOT NULL,
	"reasons" jsonb DEFAULT '[]'::jsonb NOT NULL,
	"revision" integer DEFAULT 1 NOT NULL,
	"created_at" timestamp with time zone NOT NULL,
	"saved_at" timestamp with time zone NOT NULL,
	"saved_by" uuid NOT NULL,
	"archived_at" timestamp with time zone,
	CONSTRAINT "study_name_given" CHECK (length(trim("study"."name")) between 1 and 200),
	CONSTRAINT "study_query_form" CHECK ("study"."query" like '?%' and length("study"."query") <= 20000),
	CONSTRAINT "study_notes_length" CHECK (length("study"."notes") <= 20000),
	CONSTRAINT "study_reasons_form" CHECK (jsonb_typeof("study"."reasons") = 'array'),
	CONSTRAINT "study_visibility_known" CHECK ("study"."visibility" in ('private', 'group', 'signed-in')),
	CONSTRAINT "study_group_visible" CHECK ("study"."visibility" <> 'group' or "study"."group_id" is not null)
);
--> statement-breakpoint
CREATE TABLE "study_change" (
	"study_id" uuid NOT NULL,
	"revision" integer NOT NULL,
	"name" text NOT NULL,
	"query" text NOT NULL,
	"notes" text NOT NULL,
	"reasons" jsonb NOT NULL,
	"by" uuid NOT NULL,
	"at" timestamp with time zone NOT NULL,
	CONSTRAINT "study_change_pkey" PRIMARY KEY("study_id","revision")
);
--> statement-breakpoint
CREATE TABLE "study_pin" (
	"study_id" uuid NOT NULL,
	"version_id" uuid NOT NULL,
	CONSTRAINT "study_pin_pkey" PRIMARY KEY("study_id","version_id")
);
--> statement-breakpoint
ALTER TABLE "study" ADD CONSTRAINT "study_owner_id_person_id_fk" FOREIGN KEY ("owner_id") REFERENCES "public"."person"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "study" ADD CONSTRAINT "study_group_id_group_id_fk" FOREIGN KEY ("group_id") REFERENCES "public"."group"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "study" ADD CONSTRAINT "study_saved_by_person_id_fk" FOREIGN KEY ("saved_by") REFERENCES "public"."person"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "study_change" ADD CONSTRAINT "study_change_study_id_study_id_fk" FOREIGN KEY ("study_id") REFERENCES "public"."study"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "study_change" ADD CONSTRAINT "study_change_by_person_id_fk" FOREIGN KEY ("by") REFERENCES "public"."person"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "study_pin" ADD CONSTRAINT "study_pin_study_id_study_id_fk" FOREIGN KEY ("study_id") REFERENCES "public"."study"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "study_pin" ADD CONSTRAINT "study_pin_version_id_version_id_fk" FOREIGN KEY ("version_id") REFERENCES "public"."version"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
CREATE INDEX "study_owner_index" ON "study" USING btree ("owner_id","saved_at" DESC NULLS FIRST,"id");--> statement-breakpoint
CREATE INDEX "study_group_index" ON "study" USING btree ("group_id","saved_at" DESC NULLS FIRST,"id");--> statement-breakpoint
CREATE INDEX "study_shared_index" ON "study" USING btree ("visibility","saved_at" DESC NULLS FIRST,"id");--> statement-breakpoint
CREATE INDEX "study_pin_version_index" ON "study_pin" USING btree ("version_id");--> statement-breakpoint
do $$
begin
	if exists (select from pg_roles where rolname = 'hairsbreadth_app') then
		grant select, insert, update on study to hairsbreadth_app;
		grant select, insert on study_change to hairsbreadth_app;
		grant select, insert, delete on study_pin to hairsbreadth_app;
		revoke delete, truncate on study from hairsbreadth_app;
		revoke update, delete, truncate on study_change from hairsbreadth_app;
	end if;
end $$;
--> statement-breakpoint

-- Every state of a study stays as it was saved.
create function study_change_refuse() returns trigger language plpgsql as $$
begin
	raise exception 'The states that a study went through never change.'
		using errcode = 'restrict_violation', constraint = 'study_change_append_only';
end $$;
--> statement-breakpoint
create trigger study_change_append_only before update or delete on study_change
	for each row execute function study_change_refuse();
--> statement-breakpoint
create constraint trigger study_change_audited after insert or update or delete on study
	deferrable initially deferred for each row execute function change_audited('study', 'id');
