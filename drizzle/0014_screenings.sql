CREATE TABLE "screening" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"owner_id" uuid NOT NULL,
	"group_id" uuid,
	"visibility" text DEFAULT 'private' NOT NULL,
	"name" text NOT NULL,
	"statement" jsonb NOT NULL,
	"plan" jsonb NOT NULL,
	"checksum" text,
	"state" text DEFAULT 'queued' NOT NULL,
	"cells" integer NOT NULL,
	"cells_done" integer DEFAULT 0 NOT NULL,
	"chunks" integer NOT NULL,
	"chunks_done" integer DEFAULT 0 NOT NULL,
	"estimated_seconds" double precision NOT NULL,
	"computed_seconds" double precision DEFAULT 0 NOT NULL,
	"engine" text NOT NULL,
	"runtime" text,
	"basis_id" uuid,
	"failure" text,
	"created_at" timestamp with time zone NOT NULL,
	"started_at" timestamp with time zone,
	"finished_at" timestamp with time zone,
	CONSTRAINT "screening_name_given" CHECK (length(trim("screening"."name")) between 1 and 200),
	CONSTRAINT "screening_state_known" CHECK ("screening"."state" in ('queued', 'running', 'paused', 'finished', 'cancelled', 'failed')),
	CONSTRAINT "screening_visibility_known" CHECK ("screening"."visibility" in ('private', 'group', 'signed-in')),
	CONSTRAINT "screening_group_visible" CHECK ("screening"."visibility" <> 'group' or "screening"."group_id" is not null),
	CONSTRAINT "screening_done_range" CHECK ("screening"."chunks_done" between 0 and "screening"."chunks")
);
--> statement-breakpoint
CREATE TABLE "screening_chunk" (
	"screening_id" uuid NOT NULL,
	"position" integer NOT NULL,
	"from_cell" integer NOT NULL,
	"to_cell" integer NOT NULL,
	"pressures" "bytea",
	"bounds" "bytea",
	"done_at" timestamp with time zone,
	"seconds" double precision,
	"worker" text,
	CONSTRAINT "screening_chunk_pkey" PRIMARY KEY("screening_id","position"),
	CONSTRAINT "screening_chunk_range" CHECK ("screening_chunk"."from_cell" >= 0 and "screening_chunk"."to_cell" > "screening_chunk"."from_cell"),
	CONSTRAINT "screening_chunk_whole" CHECK (num_nonnulls("screening_chunk"."pressures", "screening_chunk"."bounds", "screening_chunk"."done_at") in (0, 3))
);
--> statement-breakpoint
ALTER TABLE "screening" ADD CONSTRAINT "screening_owner_id_person_id_fk" FOREIGN KEY ("owner_id") REFERENCES "public"."person"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "screening" ADD CONSTRAINT "screening_group_id_group_id_fk" FOREIGN KEY ("group_id") REFERENCES "public"."group"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "screening_chunk" ADD CONSTRAINT "screening_chunk_screening_id_screening_id_fk" FOREIGN KEY ("screening_id") REFERENCES "public"."screening"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
CREATE INDEX "screening_owner_index" ON "screening" USING btree ("owner_id","created_at");--> statement-breakpoint
CREATE INDEX "screening_group_index" ON "screening" USING btree ("group_id","created_at");--> statement-breakpoint
do $$
begin
	if exists (select from pg_roles where rolname = 'hairsbreadth_app') then
		grant select, insert, update on screening, screening_chunk to hairsbreadth_app;
		revoke delete, truncate on screening, screening_chunk from hairsbreadth_app;
	end if;
end $$;
--> statement-breakpoint

-- What is computed is decided once; a finished screening changes no more but for its name and who sees it.
create function screening_guard() returns trigger language plpgsql as $$
begin
	if tg_op = 'UPDATE'
		and (new.id, new.statement, new.plan, new.cells, new.chunks, new.engine, new.created_at, new.basis_id)
			is not distinct from (old.id, old.statement, old.plan, old.cells, old.chunks, old.engine, old.created_at, old.basis_id)
		and (old.state not in ('finished', 'cancelled', 'failed')
			or (new.state, new.checksum, new.cells_done, new.chunks_done, new.finished_at)
				is not distinct from (old.state, old.checksum, old.cells_done, old.chunks_done, old.finished_at)) then
		return new;
	end if;
	raise exception 'A screening that has ended stays as it is.'
		using errcode = 'restrict_violation', constraint = 'screening_permanent';
end $$;
--> statement-breakpoint
create trigger screening_guard before update or delete on screening
	for each row execute function screening_guard();
--> statement-breakpoint
create function screening_chunk_guard() returns trigger language plpgsql as $$
begin
	if tg_op = 'UPDATE' and old.done_at is null
		and (new.screening_id, new.position, new.from_cell, new.to_cell)
			= (old.screening_id, old.position, old.from_cell, old.to_cell) then
		return new;
	end if;
	raise exception 'What was computed stays as it is.'
		using errcode = 'restrict_violation', constraint = 'screening_chunk_permanent';
end $$;
--> statement-breakpoint
create trigger screening_chunk_guard before update or delete on screening_chunk
	for each row execute function screening_chunk_guard();
--> statement-breakpoint
create constraint trigger screening_created_audited after insert on screening
	deferrable initially deferred for each row execute function change_audited('screening', 'id');
--> statement-breakpoint
create constraint trigger screening_change_audited after update on screening
	deferrable initially deferred for each row
	when ((old.name, old.visibility, old.group_id, old.owner_id) is distinct from
			(new.name, new.visibility, new.group_id, new.owner_id)
		or (old.state <> new.state and new.state in ('paused', 'cancelled'))
		or (old.state = 'paused' and new.state <> 'paused'))
	execute function change_audited('screening', 'id');
