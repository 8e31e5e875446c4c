DROP INDEX "geometry_records_key";--> statement-breakpoint
ALTER TABLE "geometry_records" ADD COLUMN "weld" boolean DEFAULT false NOT NULL;--> statement-breakpoint
ALTER TABLE "geometry_records" ADD COLUMN "turn_faces" boolean DEFAULT false NOT NULL;--> statement-breakpoint
ALTER TABLE "imports" ADD COLUMN "weld" boolean DEFAULT false NOT NULL;--> statement-breakpoint
ALTER TABLE "imports" ADD COLUMN "turn_faces" boolean DEFAULT false NOT NULL;--> statement-breakpoint
CREATE UNIQUE INDEX "geometry_records_key" ON "geometry_records" USING btree ("content_sha256","scheme","boundary","triangles","creasing","parts_by","weld","turn_faces","engine_version");