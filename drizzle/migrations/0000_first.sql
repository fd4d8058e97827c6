CREATE TABLE "organisations" (
	"id" uuid PRIMARY KEY NOT NULL,
	"name" text NOT NULL,
	"created_at" timestamp with time zone NOT NULL
);
--> statement-breakpoint
CREATE TABLE "users" (
	"id" uuid PRIMARY KEY NOT NULL,
	"organisation" uuid NOT NULL,
	"email" text NOT NULL,
	"name" text NOT NULL,
	"roles" text[] NOT NULL,
	"password_hash" text NOT NULL,
	"disabled_at" timestamp with time zone,
	"created_at" timestamp with time zone NOT NULL
);
--> statement-breakpoint
CREATE TABLE "sessions" (
	"id_hash" "bytea" PRIMARY KEY NOT NULL,
	"organisation" uuid NOT NULL,
	"user" uuid NOT NULL,
	"created_at" timestamp with time zone NOT NULL,
	"last_seen_at" timestamp with time zone NOT NULL,
	"expires_at" timestamp with time zone NOT NULL,
	"revoked_at" timestamp with time zone,
	"user_agent" text DEFAULT '' NOT NULL
);
--> statement-breakpoint
CREATE TABLE "sign_in_attempts" (
	"key" text PRIMARY KEY NOT NULL,
	"attempts" integer NOT NULL,
	"window_starts_at" timestamp with time zone NOT NULL
);
--> statement-breakpoint
CREATE TABLE "org_clock" (
	"organisation" uuid PRIMARY KEY NOT NULL,
	"v" bigint NOT NULL,
	"epoch" text NOT NULL,
	"office_n" bigint NOT NULL
);
--> statement-breakpoint
CREATE TABLE "op" (
	"organisation" uuid NOT NULL,
	"id" uuid NOT NULL,
	"dev" text NOT NULL,
	"phone" text NOT NULL,
	"n" bigint NOT NULL,
	"author" uuid NOT NULL,
	"sv" integer NOT NULL,
	"kind" text NOT NULL,
	"object" uuid,
	"sheet" uuid,
	"hlc_claimed" text NOT NULL,
	"hlc_effective" text NOT NULL,
	"body" jsonb NOT NULL,
	"body_hash" "bytea" NOT NULL,
	"personal" jsonb,
	"claimed_id" uuid,
	"received_at" timestamp with time zone NOT NULL,
	"ver" bigint NOT NULL,
	"outcome" text NOT NULL,
	"reason" text,
	"detail" text,
	CONSTRAINT "op_organisation_id_pk" PRIMARY KEY("organisation","id")
);
--> statement-breakpoint
CREATE TABLE "row_state" (
	"organisation" uuid NOT NULL,
	"t" text collate "C" NOT NULL,
	"id" text collate "C" NOT NULL,
	"scope" uuid NOT NULL,
	"object" uuid NOT NULL,
	"ver" bigint NOT NULL,
	"gone" boolean DEFAULT false NOT NULL,
	"data" jsonb NOT NULL,
	CONSTRAINT "row_state_organisation_t_id_pk" PRIMARY KEY("organisation","t","id")
);
--> statement-breakpoint
CREATE TABLE "grant_scope" (
	"organisation" uuid NOT NULL,
	"person" uuid NOT NULL,
	"scope" uuid NOT NULL,
	"ver" bigint NOT NULL,
	"gone" boolean DEFAULT false NOT NULL,
	CONSTRAINT "grant_scope_organisation_person_scope_pk" PRIMARY KEY("organisation","person","scope")
);
--> statement-breakpoint
CREATE TABLE "device" (
	"organisation" uuid NOT NULL,
	"dev" text NOT NULL,
	"phone" text NOT NULL,
	"label" text NOT NULL,
	"person" uuid NOT NULL,
	"last_seen_at" timestamp with time zone NOT NULL,
	"max_n" bigint NOT NULL,
	"received" bigint NOT NULL,
	"last_hlc" text NOT NULL,
	"pending" integer NOT NULL,
	"oldest_at" timestamp with time zone,
	"blobs" integer NOT NULL,
	"sv" integer NOT NULL,
	"clock_offset_milliseconds" bigint,
	CONSTRAINT "device_organisation_dev_pk" PRIMARY KEY("organisation","dev")
);
--> statement-breakpoint
CREATE TABLE "sheets" (
	"organisation" uuid NOT NULL,
	"id" uuid NOT NULL,
	"survey" uuid NOT NULL,
	"number" text,
	"kind" text NOT NULL,
	"worker" uuid,
	"technician" uuid,
	"method" uuid,
	"state" text NOT NULL,
	"revision" integer NOT NULL,
	"is_fit" boolean,
	"handed_in_at" timestamp with time zone,
	"open_conflicts" integer NOT NULL,
	"late_changes" integer NOT NULL,
	"archived" boolean NOT NULL,
	"created_at" timestamp with time zone NOT NULL,
	"ver" bigint NOT NULL,
	CONSTRAINT "sheets_organisation_id_pk" PRIMARY KEY("organisation","id")
);
--> statement-breakpoint
CREATE TABLE "surveys" (
	"organisation" uuid NOT NULL,
	"id" uuid NOT NULL,
	"title" text NOT NULL,
	"site" uuid NOT NULL,
	"starts_on" text NOT NULL,
	"ends_on" text NOT NULL,
	"zone" text NOT NULL,
	"archived" boolean NOT NULL,
	"ver" bigint NOT NULL,
	CONSTRAINT "surveys_organisation_id_pk" PRIMARY KEY("organisation","id")
);
--> statement-breakpoint
ALTER TABLE "sessions" ADD CONSTRAINT "sessions_user_users_id_fk" FOREIGN KEY ("user") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
CREATE UNIQUE INDEX "users_email" ON "users" USING btree (lower("email"));--> statement-breakpoint
CREATE INDEX "users_organisation" ON "users" USING btree ("organisation");--> statement-breakpoint
CREATE INDEX "sessions_user" ON "sessions" USING btree ("user");--> statement-breakpoint
CREATE INDEX "op_device" ON "op" USING btree ("organisation","dev","n");--> statement-breakpoint
CREATE INDEX "op_claimed" ON "op" USING btree ("organisation","claimed_id");--> statement-breakpoint
CREATE INDEX "op_sheet" ON "op" USING btree ("organisation","sheet","ver");--> statement-breakpoint
CREATE INDEX "row_feed" ON "row_state" USING btree ("organisation","scope","ver","t","id");--> statement-breakpoint
CREATE INDEX "row_object" ON "row_state" USING btree ("organisation","object");--> statement-breakpoint
CREATE INDEX "sheets_state" ON "sheets" USING btree ("organisation","state");--> statement-breakpoint
CREATE INDEX "sheets_survey" ON "sheets" USING btree ("organisation","survey");