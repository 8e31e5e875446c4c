CREATE TABLE "part_renames" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"asset_id" uuid NOT NULL,
	"version_id" uuid NOT NULL,
	"part_id" uuid NOT NULL,
	"arrived_id" uuid NOT NULL,
	"old_name" text NOT NULL,
	"new_name" text NOT NULL,
	"decision" text NOT NULL,
	"fit" text NOT NULL,
	"decided_by" uuid NOT NULL,
	"decided_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "part_renames_decision" CHECK ("part_renames"."decision" in ('confirmed', 'refused')),
	CONSTRAINT "part_renames_fit" CHECK ("part_renames"."fit" in ('place', 'shape', 'hand')),
	CONSTRAINT "part_renames_two" CHECK ("part_renames"."part_id" <> "part_renames"."arrived_id")
);
--> statement-breakpoint
ALTER TABLE "value_setters" DROP CONSTRAINT "value_setters_act";--> statement-breakpoint
ALTER TABLE "assets" ADD COLUMN "read_name" text;--> statement-breakpoint
ALTER TABLE "assets" ADD COLUMN "read_place" text;--> statement-breakpoint
ALTER TABLE "import_files" ADD COLUMN "plan" jsonb;--> statement-breakpoint
ALTER TABLE "imports" ADD COLUMN "name_pattern" text;--> statement-breakpoint
ALTER TABLE "parts" ADD COLUMN "merged_into" uuid;--> statement-breakpoint
ALTER TABLE "part_renames" ADD CONSTRAINT "part_renames_asset_id_assets_id_fk" FOREIGN KEY ("asset_id") REFERENCES "public"."assets"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "part_renames" ADD CONSTRAINT "part_renames_version_id_asset_versions_id_fk" FOREIGN KEY ("version_id") REFERENCES "public"."asset_versions"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "part_renames" ADD CONSTRAINT "part_renames_part_id_parts_id_fk" FOREIGN KEY ("part_id") REFERENCES "public"."parts"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "part_renames" ADD CONSTRAINT "part_renames_arrived_id_parts_id_fk" FOREIGN KEY ("arrived_id") REFERENCES "public"."parts"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "part_renames" ADD CONSTRAINT "part_renames_decided_by_users_id_fk" FOREIGN KEY ("decided_by") REFERENCES "public"."users"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
CREATE INDEX "part_renames_asset_idx" ON "part_renames" USING btree ("asset_id","decided_at");--> statement-breakpoint
CREATE UNIQUE INDEX "part_renames_refused_key" ON "part_renames" USING btree ("part_id","arrived_id") WHERE decision = 'refused';--> statement-breakpoint
ALTER TABLE "parts" ADD CONSTRAINT "parts_merged_into_parts_id_fk" FOREIGN KEY ("merged_into") REFERENCES "public"."parts"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
CREATE INDEX "parts_merged_idx" ON "parts" USING btree ("merged_into") WHERE merged_into is not null;--> statement-breakpoint
ALTER TABLE "parts" ADD CONSTRAINT "parts_merged_into_another" CHECK ("parts"."merged_into" <> "parts"."id");--> statement-breakpoint
ALTER TABLE "value_setters" ADD CONSTRAINT "value_setters_act" CHECK ("value_setters"."act" in ('setting', 'version', 'scale', 'material', 'rule', 'rename'));