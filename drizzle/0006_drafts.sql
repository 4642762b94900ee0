CREATE TABLE "design_drafts" (
	"team_id" uuid NOT NULL,
	"user_id" uuid NOT NULL,
	"subject_id" uuid NOT NULL,
	"plant_id" uuid NOT NULL,
	"design_id" uuid,
	"design_revision_id" uuid,
	"plant_revision_id" uuid NOT NULL,
	"base_revision_id" uuid,
	"base_version" integer,
	"form" jsonb NOT NULL,
	"mark" uuid NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"updated_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "design_drafts_team_id_user_id_subject_id_pk" PRIMARY KEY("team_id","user_id","subject_id"),
	CONSTRAINT "design_drafts_subject" CHECK ("design_drafts"."subject_id" = coalesce("design_drafts"."design_revision_id", "design_drafts"."design_id", "design_drafts"."plant_id")),
	CONSTRAINT "design_drafts_base" CHECK (("design_drafts"."base_revision_id" is null) = ("design_drafts"."base_version" is null)),
	CONSTRAINT "design_drafts_form" CHECK (jsonb_typeof("design_drafts"."form") = 'object' and octet_length("design_drafts"."form"::text) <= 1048576)
);
--> statement-breakpoint
ALTER TABLE "design_drafts" ADD CONSTRAINT "design_drafts_member" FOREIGN KEY ("team_id","user_id") REFERENCES "public"."memberships"("team_id","user_id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "design_drafts" ADD CONSTRAINT "design_drafts_plant" FOREIGN KEY ("team_id","plant_id") REFERENCES "public"."plants"("team_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "design_drafts" ADD CONSTRAINT "design_drafts_design" FOREIGN KEY ("team_id","plant_id","design_id") REFERENCES "public"."designs"("team_id","plant_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "design_drafts" ADD CONSTRAINT "design_drafts_design_revision" FOREIGN KEY ("team_id","design_revision_id") REFERENCES "public"."design_revisions"("team_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "design_drafts" ADD CONSTRAINT "design_drafts_plant_revision" FOREIGN KEY ("team_id","plant_id","plant_revision_id") REFERENCES "public"."plant_revisions"("team_id","plant_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "design_drafts" ADD CONSTRAINT "design_drafts_base_revision" FOREIGN KEY ("team_id","base_revision_id") REFERENCES "public"."design_revisions"("team_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
CREATE INDEX "design_drafts_design_index" ON "design_drafts" USING btree ("team_id","plant_id","design_id");--> statement-breakpoint
CREATE INDEX "design_drafts_design_revision_index" ON "design_drafts" USING btree ("team_id","design_revision_id");--> statement-breakpoint
CREATE INDEX "design_drafts_plant_revision_index" ON "design_drafts" USING btree ("team_id","plant_id","plant_revision_id");--> statement-breakpoint
CREATE INDEX "design_drafts_base_revision_index" ON "design_drafts" USING btree ("team_id","base_revision_id");--> statement-breakpoint
CREATE INDEX "design_drafts_age" ON "design_drafts" USING btree ("updated_at");