DROP INDEX "study_owner_index";--> statement-breakpoint
DROP INDEX "study_group_index";--> statement-breakpoint
DROP INDEX "study_shared_index";--> statement-breakpoint
DROP INDEX "study_pin_version_index";--> statement-breakpoint
CREATE INDEX "study_owner_index" ON "study" USING btree ("owner_id","saved_at" DESC NULLS FIRST,"id");--> statement-breakpoint
CREATE INDEX "study_group_index" ON "study" USING btree ("group_id","saved_at" DESC NULLS FIRST,"id");--> statement-breakpoint
CREATE INDEX "study_shared_index" ON "study" USING btree ("visibility","saved_at" DESC NULLS FIRST,"id");--> statement-breakpoint
CREATE INDEX "study_pin_version_index" ON "study_pin" USING btree ("version_id");