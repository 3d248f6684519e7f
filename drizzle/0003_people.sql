CREATE TABLE "group" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"slug" text NOT NULL,
	"name" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"closed_at" timestamp with time zone,
	CONSTRAINT "group_slug_key" UNIQUE("slug"),
	CONSTRAINT "group_slug_form" CHECK ("group"."slug" ~ '^[a-z0-9]+(-[a-z0-9]+)*$'),
	CONSTRAINT "group_name_given" CHECK (length(trim("group"."name")) between 2 and 80)
);
--> statement-breakpoint
CREATE TABLE "membership" (
	"group_id" uuid NOT NULL,
	"person_id" uuid NOT NULL,
	"lead" boolean DEFAULT false NOT NULL,
	"joined_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "membership_pkey" PRIMARY KEY("group_id","person_id")
);
--> statement-breakpoint
CREATE TABLE "invitation" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"secret_hash" "bytea" NOT NULL,
	"email" text NOT NULL,
	"role" text NOT NULL,
	"group_id" uuid,
	"lead" boolean DEFAULT false NOT NULL,
	"invited_by" uuid NOT NULL,
	"created_at" timestamp with time zone NOT NULL,
	"expires_at" timestamp with time zone NOT NULL,
	"accepted_at" timestamp with time zone,
	"accepted_by" uuid,
	"revoked_at" timestamp with time zone,
	CONSTRAINT "invitation_secret_key" UNIQUE("secret_hash"),
	CONSTRAINT "invitation_role_known" CHECK ("invitation"."role" in ('reader', 'researcher', 'curator', 'administrator')),
	CONSTRAINT "invitation_email_form" CHECK ("invitation"."email" = lower("invitation"."email")),
	CONSTRAINT "invitation_one_end" CHECK (num_nonnulls("invitation"."accepted_at", "invitation"."revoked_at") <= 1),
	CONSTRAINT "invitation_acceptance_whole" CHECK (("invitation"."accepted_at" is null) = ("invitation"."accepted_by" is null)),
	CONSTRAINT "invitation_lead_of_group" CHECK (not "invitation"."lead" or "invitation"."group_id" is not null)
);
--> statement-breakpoint
CREATE TABLE "outbox" (
	"id" bigint PRIMARY KEY GENERATED ALWAYS AS IDENTITY (sequence name "outbox_id_seq" INCREMENT BY 1 MINVALUE 1 MAXVALUE 9223372036854775807 START WITH 1 CACHE 1),
	"message_id" uuid DEFAULT gen_random_uuid() NOT NULL,
	"kind" text NOT NULL,
	"recipient" text NOT NULL,
	"data" jsonb NOT NULL,
	"sealed" text,
	"state" text DEFAULT 'waiting' NOT NULL,
	"attempts" integer DEFAULT 0 NOT NULL,
	"next_attempt_at" timestamp with time zone NOT NULL,
	"useless_after" timestamp with time zone,
	"created_at" timestamp with time zone NOT NULL,
	"sent_at" timestamp with time zone,
	"last_error" text,
	CONSTRAINT "outbox_state_known" CHECK ("outbox"."state" in ('waiting', 'sent', 'failed', 'void')),
	CONSTRAINT "outbox_sent_whole" CHECK (("outbox"."state" = 'sent') = ("outbox"."sent_at" is not null)),
	CONSTRAINT "outbox_secret_forgotten" CHECK ("outbox"."state" = 'waiting' or "outbox"."sealed" is null)
);
--> statement-breakpoint
CREATE TABLE "account_link" (
	"provider" text NOT NULL,
	"subject" text NOT NULL,
	"person_id" uuid NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "account_link_pkey" PRIMARY KEY("provider","subject"),
	CONSTRAINT "account_link_person_key" UNIQUE("person_id","provider")
);
--> statement-breakpoint
CREATE TABLE "person" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"email" text,
	"name" text NOT NULL,
	"role" text NOT NULL,
	"role_from" text DEFAULT 'installation' NOT NULL,
	"state" text DEFAULT 'active' NOT NULL,
	"preferences" jsonb DEFAULT '{}'::jsonb NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"demo" text,
	CONSTRAINT "person_email_key" UNIQUE("email"),
	CONSTRAINT "person_demo_key" UNIQUE("demo"),
	CONSTRAINT "person_email_form" CHECK ("person"."email" = lower("person"."email") and position('@' in "person"."email") > 1),
	CONSTRAINT "person_email_given" CHECK (("person"."state" = 'deleted') = ("person"."email" is null)),
	CONSTRAINT "person_role_known" CHECK ("person"."role" in ('reader', 'researcher', 'curator', 'administrator')),
	CONSTRAINT "person_role_from_known" CHECK ("person"."role_from" in ('installation', 'institution')),
	CONSTRAINT "person_state_known" CHECK ("person"."state" in ('active', 'removed', 'deleted')),
	CONSTRAINT "person_name_given" CHECK (length(trim("person"."name")) between 1 and 120)
);
--> statement-breakpoint
CREATE TABLE "session" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"secret_hash" "bytea" NOT NULL,
	"person_id" uuid NOT NULL,
	"begun_by" text NOT NULL,
	"browser" text NOT NULL,
	"created_at" timestamp with time zone NOT NULL,
	"last_seen_at" timestamp with time zone NOT NULL,
	"expires_at" timestamp with time zone NOT NULL,
	CONSTRAINT "session_secret_key" UNIQUE("secret_hash"),
	CONSTRAINT "session_begun_by_known" CHECK ("session"."begun_by" in ('link', 'institution', 'invitation', 'demo')),
	CONSTRAINT "session_absolute_limit" CHECK ("session"."expires_at" <= "session"."created_at" + interval '30 days')
);
--> statement-breakpoint
CREATE TABLE "sign_in_link" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"secret_hash" "bytea" NOT NULL,
	"email" text NOT NULL,
	"browser_hash" "bytea" NOT NULL,
	"created_at" timestamp with time zone NOT NULL,
	"expires_at" timestamp with time zone NOT NULL,
	"used_at" timestamp with time zone,
	CONSTRAINT "sign_in_link_secret_key" UNIQUE("secret_hash"),
	CONSTRAINT "sign_in_link_limit" CHECK ("sign_in_link"."expires_at" <= "sign_in_link"."created_at" + interval '10 minutes')
);
--> statement-breakpoint
CREATE TABLE "api_token" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"secret_hash" "bytea" NOT NULL,
	"person_id" uuid NOT NULL,
	"name" text NOT NULL,
	"beginning" text NOT NULL,
	"scopes" text[] NOT NULL,
	"created_at" timestamp with time zone NOT NULL,
	"expires_at" timestamp with time zone NOT NULL,
	"last_used_at" timestamp with time zone,
	"revoked_at" timestamp with time zone,
	CONSTRAINT "api_token_secret_key" UNIQUE("secret_hash"),
	CONSTRAINT "api_token_year_at_most" CHECK ("api_token"."expires_at" <= "api_token"."created_at" + interval '366 days'),
	CONSTRAINT "api_token_scopes_known" CHECK (cardinality("api_token"."scopes") > 0 and "api_token"."scopes" <@ array['read', 'compute', 'upload', 'review'])
);
--> statement-breakpoint
ALTER TABLE "membership" ADD CONSTRAINT "membership_group_id_group_id_fk" FOREIGN KEY ("group_id") REFERENCES "public"."group"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "membership" ADD CONSTRAINT "membership_person_id_person_id_fk" FOREIGN KEY ("person_id") REFERENCES "public"."person"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "invitation" ADD CONSTRAINT "invitation_group_id_group_id_fk" FOREIGN KEY ("group_id") REFERENCES "public"."group"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "invitation" ADD CONSTRAINT "invitation_invited_by_person_id_fk" FOREIGN KEY ("invited_by") REFERENCES "public"."person"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "invitation" ADD CONSTRAINT "invitation_accepted_by_person_id_fk" FOREIGN KEY ("accepted_by") REFERENCES "public"."person"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "account_link" ADD CONSTRAINT "account_link_person_id_person_id_fk" FOREIGN KEY ("person_id") REFERENCES "public"."person"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "session" ADD CONSTRAINT "session_person_id_person_id_fk" FOREIGN KEY ("person_id") REFERENCES "public"."person"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "api_token" ADD CONSTRAINT "api_token_person_id_person_id_fk" FOREIGN KEY ("person_id") REFERENCES "public"."person"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
CREATE INDEX "membership_person_index" ON "membership" USING btree ("person_id","group_id");--> statement-breakpoint
CREATE INDEX "invitation_created_index" ON "invitation" USING btree ("created_at","id");--> statement-breakpoint
CREATE INDEX "invitation_group_index" ON "invitation" USING btree ("group_id");--> statement-breakpoint
CREATE INDEX "outbox_due_index" ON "outbox" USING btree ("next_attempt_at") WHERE "outbox"."state" = 'waiting';--> statement-breakpoint
CREATE INDEX "outbox_list_index" ON "outbox" USING btree ("id" DESC NULLS LAST);--> statement-breakpoint
CREATE INDEX "person_name_index" ON "person" USING btree ("name","id");--> statement-breakpoint
CREATE INDEX "session_person_index" ON "session" USING btree ("person_id","last_seen_at");--> statement-breakpoint
CREATE INDEX "sign_in_link_expiry_index" ON "sign_in_link" USING btree ("expires_at");--> statement-breakpoint
CREATE INDEX "api_token_person_index" ON "api_token" USING btree ("person_id","created_at");