DROP INDEX "geometry_records_key";--> statement-breakpoint
ALTER TABLE "geometry_records" ADD COLUMN "beside_sha256" text DEFAULT '' NOT NULL;--> statement-breakpoint
ALTER TABLE "geometry_records" ADD COLUMN "unit_scale" double precision DEFAULT 1 NOT NULL;--> statement-breakpoint
ALTER TABLE "geometry_records" ADD COLUMN "turn" text DEFAULT 'none' NOT NULL;--> statement-breakpoint
ALTER TABLE "geometry_records" ADD COLUMN "stated_metres_per_unit" double precision;--> statement-breakpoint
ALTER TABLE "geometry_records" ADD COLUMN "stated_up_axis" text;--> statement-breakpoint
ALTER TABLE "import_files" ADD COLUMN "archive_id" uuid;--> statement-breakpoint
ALTER TABLE "import_files" ADD COLUMN "archive_entry" text;--> statement-breakpoint
ALTER TABLE "import_files" ADD COLUMN "unpacked_into" integer;--> statement-breakpoint
ALTER TABLE "imports" ADD COLUMN "other_space" text DEFAULT 'convert' NOT NULL;--> statement-breakpoint
ALTER TABLE "shows" ADD COLUMN "other_space" text DEFAULT 'convert' NOT NULL;--> statement-breakpoint
ALTER TABLE "import_files" ADD CONSTRAINT "import_files_archive_id_import_files_id_fk" FOREIGN KEY ("archive_id") REFERENCES "public"."import_files"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
CREATE UNIQUE INDEX "geometry_records_key" ON "geometry_records" USING btree ("content_sha256","scheme","boundary","triangles","creasing","parts_by","weld","turn_faces","beside_sha256","unit_scale","turn","engine_version");--> statement-breakpoint
ALTER TABLE "geometry_records" ADD CONSTRAINT "geometry_records_unit_scale" CHECK ("geometry_records"."unit_scale" > 0 and "geometry_records"."unit_scale" < 'Infinity');--> statement-breakpoint
ALTER TABLE "geometry_records" ADD CONSTRAINT "geometry_records_turn" CHECK ("geometry_records"."turn" in ('none', 'y-to-z', 'z-to-y'));--> statement-breakpoint
ALTER TABLE "geometry_records" ADD CONSTRAINT "geometry_records_stated" CHECK (("geometry_records"."stated_metres_per_unit" is null or "geometry_records"."stated_metres_per_unit" > 0 and "geometry_records"."stated_metres_per_unit" < 'Infinity') and ("geometry_records"."stated_up_axis" is null or "geometry_records"."stated_up_axis" in ('y', 'z')));--> statement-breakpoint
ALTER TABLE "geometry_records" ADD CONSTRAINT "geometry_records_beside" CHECK ("geometry_records"."beside_sha256" ~ '^([0-9a-f]{64})?$');--> statement-breakpoint
ALTER TABLE "import_files" ADD CONSTRAINT "import_files_archive" CHECK (("import_files"."archive_id" is null) = ("import_files"."archive_entry" is null) and ("import_files"."unpacked_into" is null or ("import_files"."unpacked_into" >= 1 and "import_files"."state" = 'done')));--> statement-breakpoint
ALTER TABLE "imports" ADD CONSTRAINT "imports_other_space" CHECK ("imports"."other_space" in ('convert', 'refuse'));--> statement-breakpoint
ALTER TABLE "shows" ADD CONSTRAINT "shows_other_space" CHECK ("shows"."other_space" in ('convert', 'refuse'));