CREATE TABLE "audit_events" (
	"id" bigserial PRIMARY KEY NOT NULL,
	"at" timestamp with time zone NOT NULL,
	"by" uuid,
	"event" text NOT NULL,
	"subject" text NOT NULL,
	"subject_id" text,
	"detail" jsonb NOT NULL
);
--> statement-breakpoint
CREATE TABLE "benches" (
	"id" uuid PRIMARY KEY NOT NULL,
	"name" text NOT NULL,
	"note" text NOT NULL,
	"values" jsonb NOT NULL,
	"version" integer DEFAULT 1 NOT NULL,
	"created_by" uuid NOT NULL,
	"created_at" timestamp with time zone NOT NULL,
	CONSTRAINT "benches_name_unique" UNIQUE("name")
);
--> statement-breakpoint
CREATE TABLE "cases" (
	"id" uuid PRIMARY KEY NOT NULL,
	"serial" integer NOT NULL,
	"number" text NOT NULL,
	"title" text NOT NULL,
	"part" text NOT NULL,
	"lot" text NOT NULL,
	"specimen" text NOT NULL,
	"question" text NOT NULL,
	"drawing" jsonb,
	"state" text NOT NULL,
	"version" integer DEFAULT 1 NOT NULL,
	"created_by" uuid NOT NULL,
	"created_at" timestamp with time zone NOT NULL,
	"updated_at" timestamp with time zone NOT NULL,
	CONSTRAINT "cases_serial_unique" UNIQUE("serial"),
	CONSTRAINT "cases_number_unique" UNIQUE("number")
);
--> statement-breakpoint
CREATE TABLE "exposures" (
	"id" uuid PRIMARY KEY NOT NULL,
	"case_id" uuid NOT NULL,
	"number" integer NOT NULL,
	"file_name" text NOT NULL,
	"sha256" text NOT NULL,
	"byte_size" integer NOT NULL,
	"format" text NOT NULL,
	"width" integer NOT NULL,
	"height" integer NOT NULL,
	"bit_depth" integer NOT NULL,
	"full_scale" integer NOT NULL,
	"code_step" integer NOT NULL,
	"lossy" boolean NOT NULL,
	"channel" text NOT NULL,
	"note" text NOT NULL,
	"bench" jsonb NOT NULL,
	"facts" jsonb NOT NULL,
	"uploaded_by" uuid NOT NULL,
	"uploaded_at" timestamp with time zone NOT NULL,
	"withdrawn_by" uuid,
	"withdrawn_at" timestamp with time zone,
	"withdrawn_reason" text,
	CONSTRAINT "exposures_case_number" UNIQUE("case_id","number")
);
--> statement-breakpoint
CREATE TABLE "identifications" (
	"id" uuid PRIMARY KEY NOT NULL,
	"exposure_id" uuid NOT NULL,
	"run" integer NOT NULL,
	"state" text NOT NULL,
	"share" real DEFAULT 0 NOT NULL,
	"step" text DEFAULT '' NOT NULL,
	"outcome" jsonb,
	"problem" jsonb,
	"engine_version" text NOT NULL,
	"atlas_version" text NOT NULL,
	"started_by" uuid NOT NULL,
	"queued_at" timestamp with time zone NOT NULL,
	"started_at" timestamp with time zone,
	"finished_at" timestamp with time zone,
	CONSTRAINT "identifications_exposure_run" UNIQUE("exposure_id","run")
);
--> statement-breakpoint
CREATE TABLE "laboratory" (
	"id" integer PRIMARY KEY NOT NULL,
	"name" text NOT NULL,
	"kind" text NOT NULL,
	"created_at" timestamp with time zone NOT NULL
);
--> statement-breakpoint
CREATE TABLE "mail" (
	"id" uuid PRIMARY KEY NOT NULL,
	"to" text NOT NULL,
	"subject" text NOT NULL,
	"text" text NOT NULL,
	"state" text NOT NULL,
	"last_error" text,
	"created_at" timestamp with time zone NOT NULL,
	"sent_at" timestamp with time zone
);
--> statement-breakpoint
CREATE TABLE "matches" (
	"id" uuid PRIMARY KEY NOT NULL,
	"case_id" uuid NOT NULL,
	"version" integer NOT NULL,
	"identification_id" uuid NOT NULL,
	"candidate_index" integer NOT NULL,
	"candidate" jsonb NOT NULL,
	"comment" text NOT NULL,
	"state" text NOT NULL,
	"submitted_by" uuid NOT NULL,
	"submitted_at" timestamp with time zone NOT NULL,
	"decision" text,
	"decided_by" uuid,
	"decided_at" timestamp with time zone,
	"reason" text,
	"meaning" text,
	CONSTRAINT "matches_case_version" UNIQUE("case_id","version")
);
--> statement-breakpoint
CREATE TABLE "people" (
	"id" uuid PRIMARY KEY NOT NULL,
	"name" text NOT NULL,
	"email" text NOT NULL,
	"password_hash" text NOT NULL,
	"roles" text[] NOT NULL,
	"active" boolean DEFAULT true NOT NULL,
	"version" integer DEFAULT 1 NOT NULL,
	"created_at" timestamp with time zone NOT NULL,
	CONSTRAINT "people_email_unique" UNIQUE("email")
);
--> statement-breakpoint
CREATE TABLE "reference_entries" (
	"id" uuid PRIMARY KEY NOT NULL,
	"number" text NOT NULL,
	"name" text NOT NULL,
	"origin" text NOT NULL,
	"family" text NOT NULL,
	"values" jsonb NOT NULL,
	"note" text NOT NULL,
	"state" text NOT NULL,
	"version" integer DEFAULT 1 NOT NULL,
	"approved_by" uuid,
	"approved_at" timestamp with time zone,
	CONSTRAINT "reference_entries_number_unique" UNIQUE("number")
);
--> statement-breakpoint
CREATE TABLE "sessions" (
	"sid" varchar PRIMARY KEY NOT NULL,
	"sess" json NOT NULL,
	"expire" timestamp (6) NOT NULL
);
--> statement-breakpoint
ALTER TABLE "audit_events" ADD CONSTRAINT "audit_events_by_people_id_fk" FOREIGN KEY ("by") REFERENCES "public"."people"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "benches" ADD CONSTRAINT "benches_created_by_people_id_fk" FOREIGN KEY ("created_by") REFERENCES "public"."people"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "cases" ADD CONSTRAINT "cases_created_by_people_id_fk" FOREIGN KEY ("created_by") REFERENCES "public"."people"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "exposures" ADD CONSTRAINT "exposures_case_id_cases_id_fk" FOREIGN KEY ("case_id") REFERENCES "public"."cases"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "exposures" ADD CONSTRAINT "exposures_uploaded_by_people_id_fk" FOREIGN KEY ("uploaded_by") REFERENCES "public"."people"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "exposures" ADD CONSTRAINT "exposures_withdrawn_by_people_id_fk" FOREIGN KEY ("withdrawn_by") REFERENCES "public"."people"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "identifications" ADD CONSTRAINT "identifications_exposure_id_exposures_id_fk" FOREIGN KEY ("exposure_id") REFERENCES "public"."exposures"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "identifications" ADD CONSTRAINT "identifications_started_by_people_id_fk" FOREIGN KEY ("started_by") REFERENCES "public"."people"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "matches" ADD CONSTRAINT "matches_case_id_cases_id_fk" FOREIGN KEY ("case_id") REFERENCES "public"."cases"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "matches" ADD CONSTRAINT "matches_identification_id_identifications_id_fk" FOREIGN KEY ("identification_id") REFERENCES "public"."identifications"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "matches" ADD CONSTRAINT "matches_submitted_by_people_id_fk" FOREIGN KEY ("submitted_by") REFERENCES "public"."people"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "matches" ADD CONSTRAINT "matches_decided_by_people_id_fk" FOREIGN KEY ("decided_by") REFERENCES "public"."people"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "reference_entries" ADD CONSTRAINT "reference_entries_approved_by_people_id_fk" FOREIGN KEY ("approved_by") REFERENCES "public"."people"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
CREATE INDEX "audit_at" ON "audit_events" USING btree ("at");--> statement-breakpoint
CREATE INDEX "cases_state_updated" ON "cases" USING btree ("state","updated_at");--> statement-breakpoint
CREATE INDEX "exposures_case" ON "exposures" USING btree ("case_id");--> statement-breakpoint
CREATE INDEX "identifications_exposure" ON "identifications" USING btree ("exposure_id");--> statement-breakpoint
CREATE UNIQUE INDEX "identifications_one_under_way" ON "identifications" USING btree ("exposure_id") WHERE state in ('queued', 'running');--> statement-breakpoint
CREATE INDEX "mail_created" ON "mail" USING btree ("created_at");--> statement-breakpoint
CREATE INDEX "matches_state" ON "matches" USING btree ("state","submitted_at");--> statement-breakpoint
CREATE UNIQUE INDEX "matches_one_open" ON "matches" USING btree ("case_id") WHERE state = 'submitted';--> statement-breakpoint
CREATE INDEX "sessions_expire" ON "sessions" USING btree ("expire");