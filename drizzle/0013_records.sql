CREATE TABLE "group_default" (
	"group_id" uuid PRIMARY KEY NOT NULL,
	"conduction" text NOT NULL,
	"gold" text,
	"temperature_k" double precision NOT NULL,
	"changed_at" timestamp with time zone NOT NULL,
	"changed_by" uuid NOT NULL,
	CONSTRAINT "group_default_conduction_known" CHECK ("group_default"."conduction" in ('drude', 'plasma')),
	CONSTRAINT "group_default_gold_form" CHECK ("group_default"."gold" ~ '^[a-z0-9]+(-[a-z0-9]+)*@[0-9]+\.[0-9]+$'),
	CONSTRAINT "group_default_temperature_range" CHECK ("group_default"."temperature_k" between 0 and 3000)
);
--> statement-breakpoint
CREATE TABLE "record" (
	"checksum" text PRIMARY KEY NOT NULL,
	"content" text NOT NULL,
	"study_id" uuid NOT NULL,
	"name" text NOT NULL,
	"frozen_by" uuid NOT NULL,
	"frozen_at" timestamp with time zone NOT NULL,
	CONSTRAINT "record_checksum_form" CHECK ("record"."checksum" ~ '^[0-9a-f]{64}$'),
	CONSTRAINT "record_checksum_true" CHECK ("record"."checksum" = encode(sha256(convert_to("record"."content", 'UTF8')), 'hex')),
	CONSTRAINT "record_name_given" CHECK (length(trim("record"."name")) between 1 and 200)
);
--> statement-breakpoint
CREATE TABLE "record_access" (
	"checksum" text PRIMARY KEY NOT NULL,
	"owner_id" uuid NOT NULL,
	"group_id" uuid,
	"visibility" text NOT NULL,
	"changed_at" timestamp with time zone NOT NULL,
	CONSTRAINT "record_access_visibility_known" CHECK ("record_access"."visibility" in ('private', 'group', 'signed-in', 'everybody')),
	CONSTRAINT "record_access_group_visible" CHECK ("record_access"."visibility" <> 'group' or "record_access"."group_id" is not null)
);
--> statement-breakpoint
CREATE TABLE "record_pin" (
	"checksum" text NOT NULL,
	"version_id" uuid NOT NULL,
	CONSTRAINT "record_pin_pkey" PRIMARY KEY("checksum","version_id")
);
--> statement-breakpoint
CREATE TABLE "study_link" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"study_id" uuid NOT NULL,
	"secret_hash" text NOT NULL,
	"created_by" uuid NOT NULL,
	"created_at" timestamp with time zone NOT NULL,
	"expires_at" timestamp with time zone NOT NULL,
	"revoked_at" timestamp with time zone,
	CONSTRAINT "study_link_secret_key" UNIQUE("secret_hash"),
	CONSTRAINT "study_link_secret_form" CHECK ("study_link"."secret_hash" ~ '^[0-9a-f]{64}$'),
	CONSTRAINT "study_link_expires_later" CHECK ("study_link"."expires_at" > "study_link"."created_at")
);
--> statement-breakpoint
ALTER TABLE "group_default" ADD CONSTRAINT "group_default_group_id_group_id_fk" FOREIGN KEY ("group_id") REFERENCES "public"."group"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "group_default" ADD CONSTRAINT "group_default_changed_by_person_id_fk" FOREIGN KEY ("changed_by") REFERENCES "public"."person"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "record" ADD CONSTRAINT "record_study_id_study_id_fk" FOREIGN KEY ("study_id") REFERENCES "public"."study"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "record" ADD CONSTRAINT "record_frozen_by_person_id_fk" FOREIGN KEY ("frozen_by") REFERENCES "public"."person"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "record_access" ADD CONSTRAINT "record_access_checksum_record_checksum_fk" FOREIGN KEY ("checksum") REFERENCES "public"."record"("checksum") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "record_access" ADD CONSTRAINT "record_access_owner_id_person_id_fk" FOREIGN KEY ("owner_id") REFERENCES "public"."person"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "record_access" ADD CONSTRAINT "record_access_group_id_group_id_fk" FOREIGN KEY ("group_id") REFERENCES "public"."group"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "record_pin" ADD CONSTRAINT "record_pin_checksum_record_checksum_fk" FOREIGN KEY ("checksum") REFERENCES "public"."record"("checksum") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "record_pin" ADD CONSTRAINT "record_pin_version_id_version_id_fk" FOREIGN KEY ("version_id") REFERENCES "public"."version"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "study_link" ADD CONSTRAINT "study_link_study_id_study_id_fk" FOREIGN KEY ("study_id") REFERENCES "public"."study"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "study_link" ADD CONSTRAINT "study_link_created_by_person_id_fk" FOREIGN KEY ("created_by") REFERENCES "public"."person"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
CREATE INDEX "record_study_index" ON "record" USING btree ("study_id","frozen_at");--> statement-breakpoint
CREATE INDEX "record_access_owner_index" ON "record_access" USING btree ("owner_id","changed_at");--> statement-breakpoint
CREATE INDEX "record_access_group_index" ON "record_access" USING btree ("group_id","changed_at");--> statement-breakpoint
CREATE INDEX "record_pin_version_index" ON "record_pin" USING btree ("version_id");--> statement-breakpoint
CREATE INDEX "study_link_study_index" ON "study_link" USING btree ("study_id","created_at");--> statement-breakpoint
do $$
begin
	if exists (select from pg_roles where rolname = 'hairsbreadth_app') then
		grant select, insert on record, record_pin to hairsbreadth_app;
		revoke update, delete, truncate on record, record_pin from hairsbreadth_app;
		grant select, insert, update on record_access, study_link, group_default to hairsbreadth_app;
		grant delete on study_link to hairsbreadth_app;
		revoke delete, truncate on record_access, group_default from hairsbreadth_app;
	end if;
end $$;
--> statement-breakpoint

-- A record stays as it was frozen, for the owner of the database too.
create function record_refuse() returns trigger language plpgsql as $$
begin
	raise exception 'A record never changes.'
		using errcode = 'restrict_violation', constraint = 'record_permanent';
end $$;
--> statement-breakpoint
create trigger record_permanent before update or delete on record
	for each row execute function record_refuse();
--> statement-breakpoint
create trigger record_permanent_whole before truncate on record
	for each statement execute function record_refuse();
--> statement-breakpoint
create trigger record_pin_permanent before update or delete on record_pin
	for each row execute function record_refuse();
--> statement-breakpoint
create trigger record_pin_permanent_whole before truncate on record_pin
	for each statement execute function record_refuse();
--> statement-breakpoint
create constraint trigger record_audited after insert on record
	deferrable initially deferred for each row execute function change_audited('record', 'checksum');
--> statement-breakpoint
create constraint trigger record_access_audited after insert or update or delete on record_access
	deferrable initially deferred for each row execute function change_audited('record', 'checksum');
--> statement-breakpoint
create constraint trigger group_default_audited after insert or update or delete on group_default
	deferrable initially deferred for each row execute function change_audited('group', 'group_id');
--> statement-breakpoint

-- Of a link only the time at which it was taken back is written later, once. With a private study of a deleted account it goes.
create function study_link_guard() returns trigger language plpgsql as $$
begin
	if tg_op = 'UPDATE' and old.revoked_at is null
		and (new.id, new.study_id, new.secret_hash, new.created_by, new.created_at, new.expires_at)
			is not distinct from (old.id, old.study_id, old.secret_hash, old.created_by, old.created_at, old.expires_at) then
		return new;
	elsif tg_op = 'DELETE' and exists (select from study join person on person.id = study.owner_id
			where study.id = old.study_id and study.visibility = 'private' and person.state = 'deleted') then
		return old;
	end if;
	raise exception 'A link is made once and taken back once.'
		using errcode = 'restrict_violation', constraint = 'study_link_permanent';
end $$;
--> statement-breakpoint
create trigger study_link_guard before update or delete on study_link
	for each row execute function study_link_guard();
--> statement-breakpoint
create constraint trigger study_link_audited after insert or update on study_link
	deferrable initially deferred for each row execute function change_audited('study', 'study_id');
