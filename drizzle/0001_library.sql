CREATE TABLE "audit_entry" (
	"id" bigint PRIMARY KEY NOT NULL,
	"at" timestamp with time zone NOT NULL,
	"actor" text NOT NULL,
	"action" text NOT NULL,
	"object_type" text NOT NULL,
	"object_id" text NOT NULL,
	"from_state" text,
	"to_state" text,
	"details" jsonb NOT NULL,
	"transaction_id" bigint NOT NULL,
	"previous_hash" text NOT NULL,
	"hash" text NOT NULL,
	CONSTRAINT "audit_entry_hash_key" UNIQUE("hash"),
	CONSTRAINT "audit_entry_previous_hash_key" UNIQUE("previous_hash"),
	CONSTRAINT "audit_entry_actor_given" CHECK (length(trim("audit_entry"."actor")) > 0),
	CONSTRAINT "audit_entry_details_form" CHECK (jsonb_typeof("audit_entry"."details") = 'object')
);
--> statement-breakpoint
CREATE TABLE "check_result" (
	"version_id" uuid NOT NULL,
	"code" text NOT NULL,
	"position" smallint NOT NULL,
	"severity" text NOT NULL,
	"message" text NOT NULL,
	"figure" double precision,
	"threshold" double precision,
	"answer" text,
	CONSTRAINT "check_result_key" PRIMARY KEY("version_id","code"),
	CONSTRAINT "check_result_severity_known" CHECK ("check_result"."severity" in ('fail', 'warn', 'info')),
	CONSTRAINT "check_result_figure_finite" CHECK ("check_result"."figure" > '-Infinity' and "check_result"."figure" < 'Infinity'),
	CONSTRAINT "check_result_threshold_finite" CHECK ("check_result"."threshold" > '-Infinity' and "check_result"."threshold" < 'Infinity')
);
--> statement-breakpoint
CREATE TABLE "dataset" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"slug" text NOT NULL,
	"title" text NOT NULL,
	"material_id" uuid NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "dataset_slug_key" UNIQUE("slug"),
	CONSTRAINT "dataset_slug_form" CHECK ("dataset"."slug" ~ '^[a-z0-9]+(-[a-z0-9]+)*$')
);
--> statement-breakpoint
CREATE TABLE "version" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"dataset_id" uuid NOT NULL,
	"major" integer NOT NULL,
	"minor" integer NOT NULL,
	"state" text DEFAULT 'draft' NOT NULL,
	"quality" text NOT NULL,
	"quality_reason" text,
	"kind" text NOT NULL,
	"model" jsonb NOT NULL,
	"checksum" text NOT NULL,
	"fingerprint" text NOT NULL,
	"conducts" boolean NOT NULL,
	"static_permittivity" double precision,
	"measured_low_ev" double precision,
	"measured_high_ev" double precision,
	"valid_low_ev" double precision,
	"valid_high_ev" double precision,
	"temperature_k" double precision,
	"sample" jsonb,
	"note" text,
	"parent_id" uuid,
	"given_columns" jsonb,
	"given_abscissa" double precision[],
	"given_first" double precision[],
	"given_second" double precision[],
	"epsilon1" double precision[],
	"raw" "bytea",
	"raw_name" text,
	"raw_sha256" text,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"created_by" text NOT NULL,
	"submitted_at" timestamp with time zone,
	"submitted_by" text,
	"published_at" timestamp with time zone,
	"published_by" text,
	"withdrawn_at" timestamp with time zone,
	"withdrawn_by" text,
	"withdrawn_reason" text,
	CONSTRAINT "version_number_key" UNIQUE("dataset_id","major","minor"),
	CONSTRAINT "version_number_range" CHECK ("version"."major" >= 0 and "version"."minor" >= 0),
	CONSTRAINT "version_state_known" CHECK ("version"."state" in ('draft', 'in_review', 'published', 'withdrawn')),
	CONSTRAINT "version_quality_known" CHECK ("version"."quality" in ('checked', 'provisional')),
	CONSTRAINT "version_provisional_has_reason" CHECK ("version"."quality" = 'checked' or length(trim("version"."quality_reason")) > 0),
	CONSTRAINT "version_kind_known" CHECK ("version"."kind" in ('table', 'model')),
	CONSTRAINT "version_model_form" CHECK (jsonb_typeof("version"."model") = 'object' and jsonb_typeof("version"."model" -> 'kind') = 'string'),
	CONSTRAINT "version_checksum_form" CHECK ("version"."checksum" ~ '^sha256:[0-9a-f]{64}$'),
	CONSTRAINT "version_fingerprint_form" CHECK ("version"."fingerprint" ~ '^sha256:[0-9a-f]{64}$'),
	CONSTRAINT "version_static_permittivity_of_insulators" CHECK (("version"."conducts" and "version"."static_permittivity" is null) or (not "version"."conducts" and "version"."static_permittivity" is not null and "version"."static_permittivity" > '-Infinity' and "version"."static_permittivity" < 'Infinity')),
	CONSTRAINT "version_measured_range" CHECK (("version"."measured_low_ev" is null and "version"."measured_high_ev" is null) or ("version"."measured_low_ev" >= 0 and "version"."measured_low_ev" < "version"."measured_high_ev" and "version"."measured_high_ev" < 'Infinity')),
	CONSTRAINT "version_valid_range" CHECK (("version"."valid_low_ev" is null and "version"."valid_high_ev" is null) or ("version"."valid_low_ev" >= 0 and "version"."valid_low_ev" < "version"."valid_high_ev" and "version"."valid_high_ev" < 'Infinity')),
	CONSTRAINT "version_temperature_range" CHECK ("version"."temperature_k" > 0 and "version"."temperature_k" > '-Infinity' and "version"."temperature_k" < 'Infinity'),
	CONSTRAINT "version_given_abscissa_finite" CHECK (all_finite("version"."given_abscissa")),
	CONSTRAINT "version_given_first_finite" CHECK (all_finite("version"."given_first")),
	CONSTRAINT "version_given_second_finite" CHECK (all_finite("version"."given_second")),
	CONSTRAINT "version_epsilon1_finite" CHECK (all_finite("version"."epsilon1")),
	CONSTRAINT "version_rows_complete" CHECK ("version"."kind" = 'model' or ("version"."given_columns" is not null and cardinality("version"."given_abscissa") = cardinality("version"."given_first") and ("version"."given_second" is null or cardinality("version"."given_second") = cardinality("version"."given_abscissa")))),
	CONSTRAINT "version_raw_complete" CHECK (num_nonnulls("version"."raw", "version"."raw_name", "version"."raw_sha256") in (0, 3)),
	CONSTRAINT "version_published_by_another" CHECK ("version"."published_by" is null or "version"."published_by" = 'installation' or "version"."published_by" <> "version"."submitted_by"),
	CONSTRAINT "version_published_fields" CHECK (("version"."state" in ('published', 'withdrawn')) = ("version"."published_at" is not null and "version"."published_by" is not null)),
	CONSTRAINT "version_withdrawn_fields" CHECK (("version"."state" = 'withdrawn') = ("version"."withdrawn_at" is not null and "version"."withdrawn_by" is not null and length(trim("version"."withdrawn_reason")) > 0))
);
--> statement-breakpoint
CREATE TABLE "version_source" (
	"version_id" uuid NOT NULL,
	"source_id" uuid NOT NULL,
	"position" smallint NOT NULL,
	CONSTRAINT "version_source_key" PRIMARY KEY("version_id","source_id"),
	CONSTRAINT "version_source_position_key" UNIQUE("version_id","position")
);
--> statement-breakpoint
CREATE TABLE "material" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"slug" text NOT NULL,
	"name" text NOT NULL,
	"formula" text,
	"class" text NOT NULL,
	"density_g_per_cm3" double precision,
	"aliases" text[] DEFAULT '{}'::text[] NOT NULL,
	"cas_number" text,
	"static_permittivity" double precision,
	"static_permittivity_source" text,
	"refractive_index_d" double precision,
	"notes" text,
	"hazards" jsonb,
	"search_text" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "material_slug_key" UNIQUE("slug"),
	CONSTRAINT "material_slug_form" CHECK ("material"."slug" ~ '^[a-z0-9]+(-[a-z0-9]+)*$'),
	CONSTRAINT "material_class_known" CHECK ("material"."class" in ('metal', 'semiconductor', 'insulator', 'polymer', 'liquid', 'gas')),
	CONSTRAINT "material_density_positive" CHECK ("material"."density_g_per_cm3" > 0 and "material"."density_g_per_cm3" > '-Infinity' and "material"."density_g_per_cm3" < 'Infinity'),
	CONSTRAINT "material_static_permittivity_range" CHECK ("material"."static_permittivity" >= 1 and "material"."static_permittivity" > '-Infinity' and "material"."static_permittivity" < 'Infinity'),
	CONSTRAINT "material_refractive_index_range" CHECK ("material"."refractive_index_d" > 0 and "material"."refractive_index_d" > '-Infinity' and "material"."refractive_index_d" < 'Infinity')
);
--> statement-breakpoint
CREATE TABLE "rate_counter" (
	"key" text NOT NULL,
	"window_start" bigint NOT NULL,
	"used" double precision NOT NULL,
	CONSTRAINT "rate_counter_pkey" PRIMARY KEY("key","window_start"),
	CONSTRAINT "rate_counter_used_finite" CHECK ("rate_counter"."used" >= 0 and "rate_counter"."used" < 'Infinity'::float8)
);
--> statement-breakpoint
CREATE TABLE "setting" (
	"key" text PRIMARY KEY NOT NULL,
	"value" jsonb NOT NULL,
	"updated_at" timestamp with time zone DEFAULT now() NOT NULL,
	"updated_by" text NOT NULL
);
--> statement-breakpoint
CREATE TABLE "source" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"slug" text NOT NULL,
	"title" text NOT NULL,
	"authors" text[] NOT NULL,
	"year" integer NOT NULL,
	"kind" text NOT NULL,
	"container" text,
	"volume" text,
	"pages" text,
	"doi" text,
	"url" text,
	"licence" text,
	"note" text,
	"search_text" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "source_slug_key" UNIQUE("slug"),
	CONSTRAINT "source_slug_form" CHECK ("source"."slug" ~ '^[a-z0-9]+(-[a-z0-9]+)*$'),
	CONSTRAINT "source_kind_known" CHECK ("source"."kind" in ('article', 'book', 'measurement', 'standard', 'computation')),
	CONSTRAINT "source_authors_given" CHECK (cardinality("source"."authors") > 0),
	CONSTRAINT "source_year_range" CHECK ("source"."year" between 1600 and 2200),
	CONSTRAINT "source_doi_form" CHECK ("source"."doi" like '10.%/%'),
	CONSTRAINT "source_url_form" CHECK ("source"."url" ~ '^https?://')
);
--> statement-breakpoint
ALTER TABLE "check_result" ADD CONSTRAINT "check_result_version_id_version_id_fk" FOREIGN KEY ("version_id") REFERENCES "public"."version"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "dataset" ADD CONSTRAINT "dataset_material_id_material_id_fk" FOREIGN KEY ("material_id") REFERENCES "public"."material"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "version" ADD CONSTRAINT "version_dataset_id_dataset_id_fk" FOREIGN KEY ("dataset_id") REFERENCES "public"."dataset"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "version" ADD CONSTRAINT "version_parent_fk" FOREIGN KEY ("parent_id") REFERENCES "public"."version"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "version_source" ADD CONSTRAINT "version_source_version_id_version_id_fk" FOREIGN KEY ("version_id") REFERENCES "public"."version"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "version_source" ADD CONSTRAINT "version_source_source_id_source_id_fk" FOREIGN KEY ("source_id") REFERENCES "public"."source"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
CREATE INDEX "audit_entry_object_index" ON "audit_entry" USING btree ("object_type","object_id","id");--> statement-breakpoint
CREATE INDEX "audit_entry_actor_index" ON "audit_entry" USING btree ("actor","id");--> statement-breakpoint
CREATE INDEX "dataset_material_index" ON "dataset" USING btree ("material_id","slug");--> statement-breakpoint
CREATE INDEX "version_latest_index" ON "version" USING btree ("dataset_id","state","major" DESC NULLS LAST,"minor" DESC NULLS LAST);--> statement-breakpoint
CREATE INDEX "version_parent_index" ON "version" USING btree ("parent_id");--> statement-breakpoint
CREATE INDEX "version_fingerprint_index" ON "version" USING btree ("fingerprint");--> statement-breakpoint
CREATE INDEX "version_measured_index" ON "version" USING btree ("measured_low_ev","measured_high_ev");--> statement-breakpoint
CREATE INDEX "version_source_source_index" ON "version_source" USING btree ("source_id");--> statement-breakpoint
CREATE INDEX "material_class_name_index" ON "material" USING btree ("class","name");--> statement-breakpoint
CREATE INDEX "material_name_index" ON "material" USING btree ("name");--> statement-breakpoint
CREATE INDEX "material_search_index" ON "material" USING gin ("search_text" gin_trgm_ops);--> statement-breakpoint
CREATE INDEX "rate_counter_window_start_idx" ON "rate_counter" USING btree ("window_start");--> statement-breakpoint
CREATE INDEX "source_search_index" ON "source" USING gin ("search_text" gin_trgm_ops);