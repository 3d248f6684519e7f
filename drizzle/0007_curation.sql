CREATE TABLE "answered_request" (
	"person_id" uuid NOT NULL,
	"key" text NOT NULL,
	"request" text NOT NULL,
	"status" integer,
	"body" text,
	"at" timestamp with time zone NOT NULL,
	CONSTRAINT "answered_request_pkey" PRIMARY KEY("person_id","key"),
	CONSTRAINT "answered_request_key_length" CHECK (length("answered_request"."key") between 1 and 200)
);
--> statement-breakpoint
CREATE TABLE "notification" (
	"id" bigint PRIMARY KEY GENERATED ALWAYS AS IDENTITY (sequence name "notification_id_seq" INCREMENT BY 1 MINVALUE 1 MAXVALUE 9223372036854775807 START WITH 1 CACHE 1),
	"person_id" uuid NOT NULL,
	"kind" text NOT NULL,
	"data" jsonb NOT NULL,
	"created_at" timestamp with time zone NOT NULL,
	"read_at" timestamp with time zone,
	CONSTRAINT "notification_data_form" CHECK (jsonb_typeof("notification"."data") = 'object')
);
--> statement-breakpoint
CREATE TABLE "upload" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"person_id" uuid NOT NULL,
	"raw" "bytea",
	"raw_name" text,
	"form" jsonb NOT NULL,
	"revision" integer DEFAULT 0 NOT NULL,
	"version_id" uuid,
	"created_at" timestamp with time zone NOT NULL,
	"saved_at" timestamp with time zone NOT NULL,
	CONSTRAINT "upload_raw_complete" CHECK (num_nonnulls("upload"."raw", "upload"."raw_name") in (0, 2)),
	CONSTRAINT "upload_raw_size" CHECK (octet_length("upload"."raw") <= 5000000),
	CONSTRAINT "upload_form_form" CHECK (jsonb_typeof("upload"."form") = 'object')
);
--> statement-breakpoint
ALTER TABLE "dataset" ADD COLUMN "recommended_major" integer;--> statement-breakpoint
ALTER TABLE "dataset" ADD COLUMN "recommended_minor" integer;--> statement-breakpoint
ALTER TABLE "version" ADD COLUMN "given_uncertainties" jsonb;--> statement-breakpoint
ALTER TABLE "answered_request" ADD CONSTRAINT "answered_request_person_id_person_id_fk" FOREIGN KEY ("person_id") REFERENCES "public"."person"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "notification" ADD CONSTRAINT "notification_person_id_person_id_fk" FOREIGN KEY ("person_id") REFERENCES "public"."person"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "upload" ADD CONSTRAINT "upload_person_id_person_id_fk" FOREIGN KEY ("person_id") REFERENCES "public"."person"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "upload" ADD CONSTRAINT "upload_version_id_version_id_fk" FOREIGN KEY ("version_id") REFERENCES "public"."version"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
CREATE INDEX "answered_request_at_index" ON "answered_request" USING btree ("at");--> statement-breakpoint
CREATE INDEX "notification_person_index" ON "notification" USING btree ("person_id","id");--> statement-breakpoint
CREATE INDEX "upload_person_index" ON "upload" USING btree ("person_id","saved_at");--> statement-breakpoint
CREATE INDEX "upload_version_index" ON "upload" USING btree ("version_id");--> statement-breakpoint
ALTER TABLE "dataset" ADD CONSTRAINT "dataset_recommended_whole" CHECK (num_nonnulls("dataset"."recommended_major", "dataset"."recommended_minor") in (0, 2));--> statement-breakpoint
ALTER TABLE "version" ADD CONSTRAINT "version_published_by_another_than_made" CHECK ("version"."published_by" is null or "version"."published_by" = 'installation' or "version"."published_by" <> "version"."created_by");--> statement-breakpoint
-- A recommendation names a published version of the dataset, and a version that is recommended is not withdrawn silently.
create function dataset_recommendation_guard() returns trigger language plpgsql as $$
begin
	if new.recommended_major is not null and not exists (
		select from version
		where dataset_id = new.id and major = new.recommended_major and minor = new.recommended_minor
			and state = 'published'
	) then
		raise exception 'Only a published version can be recommended.'
			using errcode = 'check_violation', constraint = 'dataset_recommends_published';
	end if;
	return new;
end $$;
--> statement-breakpoint
create trigger dataset_recommendation_guard before insert or update of recommended_major, recommended_minor on dataset
	for each row execute function dataset_recommendation_guard();
--> statement-breakpoint
do $$
begin
	if exists (select from pg_roles where rolname = 'hairsbreadth_app') then
		grant select, insert, update, delete on upload, answered_request, notification to hairsbreadth_app;
	end if;
end $$;
