CREATE TABLE "acknowledgements" (
	"user_id" uuid NOT NULL,
	"machine_id" uuid NOT NULL,
	"machine_version" integer NOT NULL,
	"checklist" text NOT NULL,
	"created_at" timestamp with time zone NOT NULL,
	CONSTRAINT "acknowledgements_user_id_machine_id_machine_version_pk" PRIMARY KEY("user_id","machine_id","machine_version")
);
--> statement-breakpoint
CREATE TABLE "approvals" (
	"document_id" uuid NOT NULL,
	"number" integer NOT NULL,
	"approved_by" uuid NOT NULL,
	"created_at" timestamp with time zone NOT NULL,
	CONSTRAINT "approvals_document_id_number_pk" PRIMARY KEY("document_id","number")
);
--> statement-breakpoint
CREATE TABLE "document_versions" (
	"document_id" uuid NOT NULL,
	"number" integer NOT NULL,
	"text" text NOT NULL,
	"sha256" text NOT NULL,
	"note" text,
	"created_by" uuid NOT NULL,
	"created_at" timestamp with time zone NOT NULL,
	CONSTRAINT "document_versions_document_id_number_pk" PRIMARY KEY("document_id","number")
);
--> statement-breakpoint
CREATE TABLE "documents" (
	"id" uuid PRIMARY KEY NOT NULL,
	"team_id" uuid NOT NULL,
	"kind" text NOT NULL,
	"name" text NOT NULL,
	"created_at" timestamp with time zone NOT NULL
);
--> statement-breakpoint
CREATE TABLE "jobs" (
	"id" uuid PRIMARY KEY NOT NULL,
	"team_id" uuid NOT NULL,
	"kind" text NOT NULL,
	"key" text NOT NULL,
	"subject" text NOT NULL,
	"state" text DEFAULT 'queued' NOT NULL,
	"attempts" integer DEFAULT 0 NOT NULL,
	"bytes" bigint DEFAULT 0 NOT NULL,
	"of_bytes" bigint NOT NULL,
	"layers" integer,
	"refusal" text,
	"created_at" timestamp with time zone NOT NULL,
	"started_at" timestamp with time zone,
	"ended_at" timestamp with time zone,
	"changed_at" timestamp with time zone NOT NULL
);
--> statement-breakpoint
CREATE TABLE "sessions" (
	"id" uuid PRIMARY KEY NOT NULL,
	"user_id" uuid NOT NULL,
	"created_at" timestamp with time zone NOT NULL,
	"last_seen_at" timestamp with time zone NOT NULL,
	"expires_at" timestamp with time zone NOT NULL
);
--> statement-breakpoint
CREATE TABLE "teams" (
	"id" uuid PRIMARY KEY NOT NULL,
	"name" text NOT NULL,
	"created_at" timestamp with time zone NOT NULL
);
--> statement-breakpoint
CREATE TABLE "users" (
	"id" uuid PRIMARY KEY NOT NULL,
	"team_id" uuid NOT NULL,
	"email" text NOT NULL,
	"name" text,
	"role" text NOT NULL,
	"password_hash" text NOT NULL,
	"created_at" timestamp with time zone NOT NULL
);
--> statement-breakpoint
CREATE TABLE "readings" (
	"id" uuid PRIMARY KEY NOT NULL,
	"toolpath_id" uuid NOT NULL,
	"machine_id" uuid NOT NULL,
	"machine_version" integer NOT NULL,
	"job_id" uuid NOT NULL,
	"created_by" uuid NOT NULL,
	"created_at" timestamp with time zone NOT NULL,
	"summary" text,
	"reading_sha256" text,
	"document_sha256" text,
	"table_sha256" text,
	"places_sha256" text
);
--> statement-breakpoint
CREATE TABLE "toolpaths" (
	"id" uuid PRIMARY KEY NOT NULL,
	"team_id" uuid NOT NULL,
	"name" text NOT NULL,
	"sha256" text NOT NULL,
	"bytes" bigint NOT NULL,
	"created_by" uuid NOT NULL,
	"created_at" timestamp with time zone NOT NULL,
	"refused_at" timestamp with time zone
);
--> statement-breakpoint
CREATE TABLE "tunings" (
	"id" uuid PRIMARY KEY NOT NULL,
	"team_id" uuid NOT NULL,
	"reading_id" uuid NOT NULL,
	"profile_id" uuid NOT NULL,
	"profile_version" integer NOT NULL,
	"polymer_id" uuid,
	"polymer_version" integer,
	"status" text NOT NULL,
	"engine" text NOT NULL,
	"job_id" uuid NOT NULL,
	"created_by" uuid NOT NULL,
	"created_at" timestamp with time zone NOT NULL,
	"planned" text,
	"proven" text,
	"tuned_sha256" text,
	"tuned_bytes" bigint,
	"plan_sha256" text,
	"proof_sha256" text,
	"changes_sha256" text,
	"places_sha256" text,
	"edits_sha256" text
);
--> statement-breakpoint
ALTER TABLE "acknowledgements" ADD CONSTRAINT "acknowledgements_user_id_users_id_fk" FOREIGN KEY ("user_id") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "acknowledgements" ADD CONSTRAINT "acknowledgements_version" FOREIGN KEY ("machine_id","machine_version") REFERENCES "public"."document_versions"("document_id","number") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "approvals" ADD CONSTRAINT "approvals_approved_by_users_id_fk" FOREIGN KEY ("approved_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "approvals" ADD CONSTRAINT "approvals_version" FOREIGN KEY ("document_id","number") REFERENCES "public"."document_versions"("document_id","number") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "document_versions" ADD CONSTRAINT "document_versions_document_id_documents_id_fk" FOREIGN KEY ("document_id") REFERENCES "public"."documents"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "document_versions" ADD CONSTRAINT "document_versions_created_by_users_id_fk" FOREIGN KEY ("created_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "documents" ADD CONSTRAINT "documents_team_id_teams_id_fk" FOREIGN KEY ("team_id") REFERENCES "public"."teams"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "jobs" ADD CONSTRAINT "jobs_team_id_teams_id_fk" FOREIGN KEY ("team_id") REFERENCES "public"."teams"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "sessions" ADD CONSTRAINT "sessions_user_id_users_id_fk" FOREIGN KEY ("user_id") REFERENCES "public"."users"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "users" ADD CONSTRAINT "users_team_id_teams_id_fk" FOREIGN KEY ("team_id") REFERENCES "public"."teams"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "readings" ADD CONSTRAINT "readings_toolpath_id_toolpaths_id_fk" FOREIGN KEY ("toolpath_id") REFERENCES "public"."toolpaths"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "readings" ADD CONSTRAINT "readings_job_id_jobs_id_fk" FOREIGN KEY ("job_id") REFERENCES "public"."jobs"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "readings" ADD CONSTRAINT "readings_created_by_users_id_fk" FOREIGN KEY ("created_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "readings" ADD CONSTRAINT "readings_machine_version" FOREIGN KEY ("machine_id","machine_version") REFERENCES "public"."document_versions"("document_id","number") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "toolpaths" ADD CONSTRAINT "toolpaths_team_id_teams_id_fk" FOREIGN KEY ("team_id") REFERENCES "public"."teams"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "toolpaths" ADD CONSTRAINT "toolpaths_created_by_users_id_fk" FOREIGN KEY ("created_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "tunings" ADD CONSTRAINT "tunings_team_id_teams_id_fk" FOREIGN KEY ("team_id") REFERENCES "public"."teams"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "tunings" ADD CONSTRAINT "tunings_reading_id_readings_id_fk" FOREIGN KEY ("reading_id") REFERENCES "public"."readings"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "tunings" ADD CONSTRAINT "tunings_job_id_jobs_id_fk" FOREIGN KEY ("job_id") REFERENCES "public"."jobs"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "tunings" ADD CONSTRAINT "tunings_created_by_users_id_fk" FOREIGN KEY ("created_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "tunings" ADD CONSTRAINT "tunings_profile_version" FOREIGN KEY ("profile_id","profile_version") REFERENCES "public"."document_versions"("document_id","number") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "tunings" ADD CONSTRAINT "tunings_polymer_version" FOREIGN KEY ("polymer_id","polymer_version") REFERENCES "public"."document_versions"("document_id","number") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
CREATE INDEX "acknowledgements_machine" ON "acknowledgements" USING btree ("machine_id","machine_version");--> statement-breakpoint
CREATE UNIQUE INDEX "documents_name" ON "documents" USING btree ("team_id","kind","name");--> statement-breakpoint
CREATE UNIQUE INDEX "jobs_key" ON "jobs" USING btree ("team_id","key") WHERE "jobs"."state" in ('queued', 'running', 'done');--> statement-breakpoint
CREATE INDEX "jobs_waiting" ON "jobs" USING btree ("created_at") WHERE "jobs"."state" = 'queued';--> statement-breakpoint
CREATE INDEX "jobs_changed" ON "jobs" USING btree ("team_id","changed_at");--> statement-breakpoint
CREATE INDEX "sessions_user" ON "sessions" USING btree ("user_id");--> statement-breakpoint
CREATE UNIQUE INDEX "users_email" ON "users" USING btree ("email");--> statement-breakpoint
CREATE INDEX "users_team" ON "users" USING btree ("team_id");--> statement-breakpoint
CREATE INDEX "readings_toolpath" ON "readings" USING btree ("toolpath_id");--> statement-breakpoint
CREATE INDEX "readings_job" ON "readings" USING btree ("job_id");--> statement-breakpoint
CREATE INDEX "toolpaths_team" ON "toolpaths" USING btree ("team_id","created_at");--> statement-breakpoint
CREATE INDEX "toolpaths_sha256" ON "toolpaths" USING btree ("sha256");--> statement-breakpoint
CREATE INDEX "tunings_team" ON "tunings" USING btree ("team_id","created_at");--> statement-breakpoint
CREATE INDEX "tunings_reading" ON "tunings" USING btree ("reading_id");--> statement-breakpoint
CREATE INDEX "tunings_job" ON "tunings" USING btree ("job_id");