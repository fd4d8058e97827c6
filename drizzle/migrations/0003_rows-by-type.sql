DROP INDEX "row_object";--> statement-breakpoint
CREATE INDEX "row_object" ON "row_state" USING btree ("organisation","object","t");