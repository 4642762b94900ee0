ALTER TABLE "design_revisions" ADD COLUMN "method" text GENERATED ALWAYS AS (recipe ->> 'method') STORED NOT NULL;--> statement-breakpoint
ALTER TABLE "design_revisions" ADD COLUMN "observer_kind" text GENERATED ALWAYS AS (recipe -> 'observer' ->> 'kind') STORED NOT NULL;--> statement-breakpoint
ALTER TABLE "evidence" ADD COLUMN "summary" jsonb GENERATED ALWAYS AS (case when part = 'responses' and state = 'computed' then content -> 'summary' end) STORED;--> statement-breakpoint
ALTER TABLE "plant_revisions" ADD COLUMN "axes" jsonb GENERATED ALWAYS AS (model -> 'axes') STORED NOT NULL;--> statement-breakpoint
ALTER TABLE "plant_revisions" ADD COLUMN "time_base" jsonb GENERATED ALWAYS AS (model -> 'timeBase') STORED NOT NULL;--> statement-breakpoint
ALTER TABLE "plant_revisions" ADD COLUMN "state_count" integer GENERATED ALWAYS AS (jsonb_array_length(model -> 'states')) STORED NOT NULL;--> statement-breakpoint
ALTER TABLE "plant_revisions" ADD COLUMN "input_count" integer GENERATED ALWAYS AS (jsonb_array_length(model -> 'inputs')) STORED NOT NULL;--> statement-breakpoint
ALTER TABLE "plant_revisions" ADD COLUMN "output_count" integer GENERATED ALWAYS AS (jsonb_array_length(model -> 'outputs')) STORED NOT NULL;--> statement-breakpoint
ALTER TABLE "templates" ADD COLUMN "open_parameter_count" integer GENERATED ALWAYS AS (jsonb_array_length(content -> 'openParameters')) STORED NOT NULL;--> statement-breakpoint
ALTER TABLE "templates" ADD COLUMN "state_count" integer GENERATED ALWAYS AS (jsonb_array_length(content -> 'plant' -> 'states')) STORED NOT NULL;--> statement-breakpoint
CREATE INDEX "comparisons_of_team_by_time" ON "comparisons" USING btree ("team_id","created_at","id");