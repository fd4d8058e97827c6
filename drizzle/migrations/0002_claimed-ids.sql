DROP INDEX "op_claimed";--> statement-breakpoint
CREATE INDEX "op_claimed" ON "op" USING btree ("organisation","claimed_id") WHERE "op"."claimed_id" is not null;