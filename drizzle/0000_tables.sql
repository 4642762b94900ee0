CREATE TABLE "access_tokens" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"team_id" uuid NOT NULL,
	"user_id" uuid NOT NULL,
	"name" text NOT NULL,
	"token_hash" text NOT NULL,
	"scope" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"expires_at" timestamp with time zone NOT NULL,
	"last_used_at" timestamp with time zone,
	"revoked_at" timestamp with time zone,
	CONSTRAINT "access_tokens_token_hash_unique" UNIQUE("token_hash"),
	CONSTRAINT "access_tokens_scope" CHECK ("access_tokens"."scope" in ('read', 'write')),
	CONSTRAINT "access_tokens_name_length" CHECK (length("access_tokens"."name") between 1 and 120),
	CONSTRAINT "access_tokens_token_hash" CHECK ("access_tokens"."token_hash" ~ '^[0-9a-f]{64}$')
);
--> statement-breakpoint
CREATE TABLE "invitations" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"team_id" uuid NOT NULL,
	"invited_by" uuid NOT NULL,
	"email" text NOT NULL,
	"role" text NOT NULL,
	"token_hash" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"expires_at" timestamp with time zone NOT NULL,
	"accepted_at" timestamp with time zone,
	"withdrawn_at" timestamp with time zone,
	CONSTRAINT "invitations_token_hash_unique" UNIQUE("token_hash"),
	CONSTRAINT "invitations_email_is_lower_case" CHECK ("invitations"."email" = lower("invitations"."email")),
	CONSTRAINT "invitations_role" CHECK ("invitations"."role" in ('lead', 'engineer', 'reviewer')),
	CONSTRAINT "invitations_token_hash" CHECK ("invitations"."token_hash" ~ '^[0-9a-f]{64}$')
);
--> statement-breakpoint
CREATE TABLE "password_resets" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"user_id" uuid NOT NULL,
	"token_hash" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"expires_at" timestamp with time zone NOT NULL,
	"used_at" timestamp with time zone,
	CONSTRAINT "password_resets_token_hash_unique" UNIQUE("token_hash"),
	CONSTRAINT "password_resets_token_hash" CHECK ("password_resets"."token_hash" ~ '^[0-9a-f]{64}$'),
	CONSTRAINT "password_resets_one_hour" CHECK ("password_resets"."expires_at" <= "password_resets"."created_at" + interval '60 minutes')
);
--> statement-breakpoint
CREATE TABLE "sessions" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"user_id" uuid NOT NULL,
	"team_id" uuid,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"last_seen_at" timestamp with time zone DEFAULT now() NOT NULL,
	"expires_at" timestamp with time zone NOT NULL,
	"revoked_at" timestamp with time zone
);
--> statement-breakpoint
CREATE TABLE "audit_events" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"team_id" uuid NOT NULL,
	"actor_id" uuid,
	"kind" text NOT NULL,
	"subject_type" text NOT NULL,
	"subject_id" uuid,
	"revision" integer,
	"request_id" text NOT NULL,
	"data" jsonb DEFAULT '{}'::jsonb NOT NULL,
	"at" timestamp with time zone DEFAULT clock_timestamp() NOT NULL,
	CONSTRAINT "audit_events_kind" CHECK ("audit_events"."kind" ~ '^[a-z][a-z-]*[.][a-z-]+$')
);
--> statement-breakpoint
CREATE TABLE "comparisons" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"team_id" uuid NOT NULL,
	"plant_id" uuid NOT NULL,
	"title" text NOT NULL,
	"note" text DEFAULT '' NOT NULL,
	"design_revision_ids" uuid[] NOT NULL,
	"version" integer DEFAULT 1 NOT NULL,
	"archived_at" timestamp with time zone,
	"created_by" uuid NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"updated_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "comparisons_title_length" CHECK (length("comparisons"."title") between 1 and 120),
	CONSTRAINT "comparisons_note_length" CHECK (length("comparisons"."note") <= 2000),
	CONSTRAINT "comparisons_two_to_six" CHECK (cardinality("comparisons"."design_revision_ids") between 2 and 6)
);
--> statement-breakpoint
CREATE TABLE "design_revisions" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"team_id" uuid NOT NULL,
	"plant_id" uuid NOT NULL,
	"design_id" uuid NOT NULL,
	"number" integer NOT NULL,
	"plant_revision_id" uuid NOT NULL,
	"recipe" jsonb NOT NULL,
	"method_version" text NOT NULL,
	"note" text DEFAULT '' NOT NULL,
	"created_by" uuid NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "design_revisions_number" UNIQUE("design_id","number"),
	CONSTRAINT "design_revisions_team_id" UNIQUE("team_id","id"),
	CONSTRAINT "design_revisions_number_positive" CHECK ("design_revisions"."number" >= 1),
	CONSTRAINT "design_revisions_note_length" CHECK (length("design_revisions"."note") <= 2000)
);
--> statement-breakpoint
CREATE TABLE "designs" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"team_id" uuid NOT NULL,
	"plant_id" uuid NOT NULL,
	"name" text NOT NULL,
	"version" integer DEFAULT 1 NOT NULL,
	"current_revision" integer DEFAULT 1 NOT NULL,
	"archived_at" timestamp with time zone,
	"created_by" uuid NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"updated_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "designs_team_id" UNIQUE("team_id","plant_id","id"),
	CONSTRAINT "designs_name_length" CHECK (length("designs"."name") between 1 and 120),
	CONSTRAINT "designs_version" CHECK ("designs"."version" >= 1 and "designs"."current_revision" >= 1)
);
--> statement-breakpoint
CREATE TABLE "evidence" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"team_id" uuid NOT NULL,
	"design_revision_id" uuid NOT NULL,
	"part" text NOT NULL,
	"state" text NOT NULL,
	"content" jsonb NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "evidence_part" UNIQUE("design_revision_id","part"),
	CONSTRAINT "evidence_state" CHECK ("evidence"."state" in ('computed', 'running', 'refused')),
	CONSTRAINT "evidence_part_name" CHECK ("evidence"."part" ~ '^[a-z][a-z-]{0,39}$')
);
--> statement-breakpoint
CREATE TABLE "response_records" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"team_id" uuid NOT NULL,
	"design_revision_id" uuid NOT NULL,
	"position" integer NOT NULL,
	"kind" text NOT NULL,
	"loop" text NOT NULL,
	"source" integer NOT NULL,
	"amplitude" double precision NOT NULL,
	"samples" integer NOT NULL,
	"step" double precision NOT NULL,
	"values" "bytea" NOT NULL,
	CONSTRAINT "response_records_position" UNIQUE("design_revision_id","position"),
	CONSTRAINT "response_records_kind" CHECK ("response_records"."kind" in ('step', 'initial', 'disturbance')),
	CONSTRAINT "response_records_loop" CHECK ("response_records"."loop" in ('full-state', 'observer')),
	CONSTRAINT "response_records_counts" CHECK ("response_records"."position" >= 0 and "response_records"."source" >= 0 and "response_records"."samples" >= 1),
	CONSTRAINT "response_records_finite" CHECK ("response_records"."amplitude" > '-Infinity' and "response_records"."amplitude" < 'Infinity' and "response_records"."step" > '-Infinity' and "response_records"."step" < 'Infinity' and "response_records"."step" > 0),
	CONSTRAINT "response_records_whole" CHECK (octet_length("response_records"."values") % (8 * "response_records"."samples") = 0)
);
--> statement-breakpoint
CREATE TABLE "outbox" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"team_id" uuid,
	"recipient" text NOT NULL,
	"subject" text NOT NULL,
	"text" text NOT NULL,
	"html" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"sent_at" timestamp with time zone,
	"attempts" integer DEFAULT 0 NOT NULL,
	"last_error" text,
	CONSTRAINT "outbox_one_line_headers" CHECK ("outbox"."recipient" !~ '[[:cntrl:]]' and "outbox"."subject" !~ '[[:cntrl:]]')
);
--> statement-breakpoint
CREATE TABLE "memberships" (
	"team_id" uuid NOT NULL,
	"user_id" uuid NOT NULL,
	"role" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"removed_at" timestamp with time zone,
	CONSTRAINT "memberships_team_id_user_id_pk" PRIMARY KEY("team_id","user_id"),
	CONSTRAINT "memberships_role" CHECK ("memberships"."role" in ('lead', 'engineer', 'reviewer'))
);
--> statement-breakpoint
CREATE TABLE "teams" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"name" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "teams_name_length" CHECK (length("teams"."name") between 1 and 120)
);
--> statement-breakpoint
CREATE TABLE "users" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"email" text NOT NULL,
	"name" text NOT NULL,
	"password_hash" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "users_email_unique" UNIQUE("email"),
	CONSTRAINT "users_email_is_lower_case" CHECK ("users"."email" = lower("users"."email")),
	CONSTRAINT "users_email_length" CHECK (length("users"."email") between 3 and 254),
	CONSTRAINT "users_name_length" CHECK (length("users"."name") between 1 and 120)
);
--> statement-breakpoint
CREATE TABLE "plant_revisions" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"team_id" uuid NOT NULL,
	"plant_id" uuid NOT NULL,
	"number" integer NOT NULL,
	"content" jsonb NOT NULL,
	"model" jsonb NOT NULL,
	"note" text DEFAULT '' NOT NULL,
	"created_by" uuid NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "plant_revisions_number" UNIQUE("plant_id","number"),
	CONSTRAINT "plant_revisions_team_id" UNIQUE("team_id","plant_id","id"),
	CONSTRAINT "plant_revisions_number_positive" CHECK ("plant_revisions"."number" >= 1),
	CONSTRAINT "plant_revisions_note_length" CHECK (length("plant_revisions"."note") <= 2000)
);
--> statement-breakpoint
CREATE TABLE "plants" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"team_id" uuid NOT NULL,
	"name" text NOT NULL,
	"version" integer DEFAULT 1 NOT NULL,
	"current_revision" integer DEFAULT 1 NOT NULL,
	"archived_at" timestamp with time zone,
	"created_by" uuid NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"updated_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "plants_team_id" UNIQUE("team_id","id"),
	CONSTRAINT "plants_name_length" CHECK (length("plants"."name") between 1 and 120),
	CONSTRAINT "plants_version" CHECK ("plants"."version" >= 1 and "plants"."current_revision" >= 1)
);
--> statement-breakpoint
CREATE TABLE "idempotency_keys" (
	"team_id" uuid NOT NULL,
	"user_id" uuid NOT NULL,
	"route" text NOT NULL,
	"key" text NOT NULL,
	"body_hash" text NOT NULL,
	"status" integer,
	"reply" jsonb,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "idempotency_keys_team_id_user_id_route_key_pk" PRIMARY KEY("team_id","user_id","route","key"),
	CONSTRAINT "idempotency_keys_key_length" CHECK (length("idempotency_keys"."key") between 1 and 255)
);
--> statement-breakpoint
CREATE TABLE "rate_limits" (
	"key" varchar(255) PRIMARY KEY NOT NULL,
	"points" integer DEFAULT 0 NOT NULL,
	"expire" bigint
);
--> statement-breakpoint
CREATE TABLE "templates" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"team_id" uuid NOT NULL,
	"name" text NOT NULL,
	"description" text DEFAULT '' NOT NULL,
	"content" jsonb NOT NULL,
	"version" integer DEFAULT 1 NOT NULL,
	"archived_at" timestamp with time zone,
	"created_by" uuid NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"updated_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "templates_name_length" CHECK (length("templates"."name") between 1 and 120),
	CONSTRAINT "templates_description_length" CHECK (length("templates"."description") <= 2000)
);
--> statement-breakpoint
ALTER TABLE "access_tokens" ADD CONSTRAINT "access_tokens_member" FOREIGN KEY ("team_id","user_id") REFERENCES "public"."memberships"("team_id","user_id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "invitations" ADD CONSTRAINT "invitations_team_id_teams_id_fk" FOREIGN KEY ("team_id") REFERENCES "public"."teams"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "invitations" ADD CONSTRAINT "invitations_inviter" FOREIGN KEY ("team_id","invited_by") REFERENCES "public"."memberships"("team_id","user_id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "password_resets" ADD CONSTRAINT "password_resets_user_id_users_id_fk" FOREIGN KEY ("user_id") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "sessions" ADD CONSTRAINT "sessions_user_id_users_id_fk" FOREIGN KEY ("user_id") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "sessions" ADD CONSTRAINT "sessions_member" FOREIGN KEY ("team_id","user_id") REFERENCES "public"."memberships"("team_id","user_id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "audit_events" ADD CONSTRAINT "audit_events_team_id_teams_id_fk" FOREIGN KEY ("team_id") REFERENCES "public"."teams"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "audit_events" ADD CONSTRAINT "audit_events_actor" FOREIGN KEY ("team_id","actor_id") REFERENCES "public"."memberships"("team_id","user_id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "comparisons" ADD CONSTRAINT "comparisons_plant" FOREIGN KEY ("team_id","plant_id") REFERENCES "public"."plants"("team_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "comparisons" ADD CONSTRAINT "comparisons_author" FOREIGN KEY ("team_id","created_by") REFERENCES "public"."memberships"("team_id","user_id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "design_revisions" ADD CONSTRAINT "design_revisions_design" FOREIGN KEY ("team_id","plant_id","design_id") REFERENCES "public"."designs"("team_id","plant_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "design_revisions" ADD CONSTRAINT "design_revisions_plant_revision" FOREIGN KEY ("team_id","plant_id","plant_revision_id") REFERENCES "public"."plant_revisions"("team_id","plant_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "design_revisions" ADD CONSTRAINT "design_revisions_author" FOREIGN KEY ("team_id","created_by") REFERENCES "public"."memberships"("team_id","user_id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "designs" ADD CONSTRAINT "designs_plant" FOREIGN KEY ("team_id","plant_id") REFERENCES "public"."plants"("team_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "designs" ADD CONSTRAINT "designs_author" FOREIGN KEY ("team_id","created_by") REFERENCES "public"."memberships"("team_id","user_id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "evidence" ADD CONSTRAINT "evidence_design_revision" FOREIGN KEY ("team_id","design_revision_id") REFERENCES "public"."design_revisions"("team_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "response_records" ADD CONSTRAINT "response_records_design_revision" FOREIGN KEY ("team_id","design_revision_id") REFERENCES "public"."design_revisions"("team_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "outbox" ADD CONSTRAINT "outbox_team_id_teams_id_fk" FOREIGN KEY ("team_id") REFERENCES "public"."teams"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "memberships" ADD CONSTRAINT "memberships_team_id_teams_id_fk" FOREIGN KEY ("team_id") REFERENCES "public"."teams"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "memberships" ADD CONSTRAINT "memberships_user_id_users_id_fk" FOREIGN KEY ("user_id") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "plant_revisions" ADD CONSTRAINT "plant_revisions_plant" FOREIGN KEY ("team_id","plant_id") REFERENCES "public"."plants"("team_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "plant_revisions" ADD CONSTRAINT "plant_revisions_author" FOREIGN KEY ("team_id","created_by") REFERENCES "public"."memberships"("team_id","user_id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "plants" ADD CONSTRAINT "plants_team_id_teams_id_fk" FOREIGN KEY ("team_id") REFERENCES "public"."teams"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "plants" ADD CONSTRAINT "plants_author" FOREIGN KEY ("team_id","created_by") REFERENCES "public"."memberships"("team_id","user_id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "idempotency_keys" ADD CONSTRAINT "idempotency_keys_member" FOREIGN KEY ("team_id","user_id") REFERENCES "public"."memberships"("team_id","user_id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "templates" ADD CONSTRAINT "templates_team_id_teams_id_fk" FOREIGN KEY ("team_id") REFERENCES "public"."teams"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "templates" ADD CONSTRAINT "templates_author" FOREIGN KEY ("team_id","created_by") REFERENCES "public"."memberships"("team_id","user_id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
CREATE INDEX "access_tokens_member_index" ON "access_tokens" USING btree ("team_id","user_id");--> statement-breakpoint
CREATE INDEX "invitations_team" ON "invitations" USING btree ("team_id","created_at","id");--> statement-breakpoint
CREATE INDEX "invitations_inviter_index" ON "invitations" USING btree ("team_id","invited_by");--> statement-breakpoint
CREATE INDEX "password_resets_user" ON "password_resets" USING btree ("user_id");--> statement-breakpoint
CREATE INDEX "sessions_user" ON "sessions" USING btree ("user_id");--> statement-breakpoint
CREATE INDEX "sessions_member_index" ON "sessions" USING btree ("team_id","user_id");--> statement-breakpoint
CREATE INDEX "audit_events_by_time" ON "audit_events" USING btree ("team_id","at","id");--> statement-breakpoint
CREATE INDEX "audit_events_actor_index" ON "audit_events" USING btree ("team_id","actor_id");--> statement-breakpoint
CREATE INDEX "comparisons_by_time" ON "comparisons" USING btree ("team_id","plant_id","created_at","id");--> statement-breakpoint
CREATE INDEX "comparisons_author_index" ON "comparisons" USING btree ("team_id","created_by");--> statement-breakpoint
CREATE INDEX "design_revisions_design_index" ON "design_revisions" USING btree ("team_id","plant_id","design_id");--> statement-breakpoint
CREATE INDEX "design_revisions_plant_revision_index" ON "design_revisions" USING btree ("team_id","plant_id","plant_revision_id");--> statement-breakpoint
CREATE INDEX "design_revisions_author_index" ON "design_revisions" USING btree ("team_id","created_by");--> statement-breakpoint
CREATE INDEX "designs_author_index" ON "designs" USING btree ("team_id","created_by");--> statement-breakpoint
CREATE INDEX "designs_by_update" ON "designs" USING btree ("team_id","plant_id","updated_at","id");--> statement-breakpoint
CREATE INDEX "evidence_design_revision_index" ON "evidence" USING btree ("team_id","design_revision_id");--> statement-breakpoint
CREATE INDEX "response_records_design_revision_index" ON "response_records" USING btree ("team_id","design_revision_id");--> statement-breakpoint
CREATE INDEX "outbox_by_time" ON "outbox" USING btree ("team_id","created_at","id");--> statement-breakpoint
CREATE INDEX "outbox_recipient" ON "outbox" USING btree ("recipient");--> statement-breakpoint
CREATE INDEX "memberships_user" ON "memberships" USING btree ("user_id");--> statement-breakpoint
CREATE INDEX "plant_revisions_author_index" ON "plant_revisions" USING btree ("team_id","created_by");--> statement-breakpoint
CREATE INDEX "plants_author_index" ON "plants" USING btree ("team_id","created_by");--> statement-breakpoint
CREATE INDEX "plants_by_update" ON "plants" USING btree ("team_id","updated_at","id");--> statement-breakpoint
CREATE INDEX "plants_by_name" ON "plants" USING btree ("team_id","name","id");--> statement-breakpoint
CREATE INDEX "idempotency_keys_age" ON "idempotency_keys" USING btree ("created_at");--> statement-breakpoint
CREATE INDEX "rate_limits_expire" ON "rate_limits" USING btree ("expire");--> statement-breakpoint
CREATE INDEX "templates_by_name" ON "templates" USING btree ("team_id","name","id");--> statement-breakpoint
CREATE INDEX "templates_author_index" ON "templates" USING btree ("team_id","created_by");