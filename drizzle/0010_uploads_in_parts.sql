CREATE TABLE "storage_usage" (
	"scope" text PRIMARY KEY NOT NULL,
	"bytes" bigint NOT NULL,
	"counted_at" timestamp with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
CREATE TABLE "upload_parts" (
	"upload_id" uuid NOT NULL,
	"number" integer NOT NULL,
	"sha256" text NOT NULL,
	"byte_size" integer NOT NULL,
	"stored_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "upload_parts_upload_id_number_pk" PRIMARY KEY("upload_id","number"),
	CONSTRAINT "upload_parts_sha256_shape" CHECK ("upload_parts"."sha256" ~ '^[0-9a-f]{64}$'),
	CONSTRAINT "upload_parts_number" CHECK ("upload_parts"."number" >= 1 and "upload_parts"."byte_size" > 0)
);
--> statement-breakpoint
CREATE TABLE "uploads" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"show_id" uuid NOT NULL,
	"created_by" uuid NOT NULL,
	"sha256" text NOT NULL,
	"byte_size" bigint NOT NULL,
	"part_bytes" integer NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"expires_at" timestamp with time zone NOT NULL,
	"assembling_until" timestamp with time zone,
	"refused_at" timestamp with time zone,
	"completed_at" timestamp with time zone,
	CONSTRAINT "uploads_sha256_shape" CHECK ("uploads"."sha256" ~ '^[0-9a-f]{64}$'),
	CONSTRAINT "uploads_size" CHECK ("uploads"."byte_size" > 0 and "uploads"."part_bytes" > 0)
);
--> statement-breakpoint
ALTER TABLE "blobs" ADD COLUMN "seen_at" timestamp with time zone DEFAULT now() NOT NULL;--> statement-breakpoint
ALTER TABLE "upload_parts" ADD CONSTRAINT "upload_parts_upload_id_uploads_id_fk" FOREIGN KEY ("upload_id") REFERENCES "public"."uploads"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "uploads" ADD CONSTRAINT "uploads_show_id_shows_id_fk" FOREIGN KEY ("show_id") REFERENCES "public"."shows"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "uploads" ADD CONSTRAINT "uploads_created_by_users_id_fk" FOREIGN KEY ("created_by") REFERENCES "public"."users"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
CREATE UNIQUE INDEX "uploads_content_key" ON "uploads" USING btree ("show_id","created_by","sha256");--> statement-breakpoint
CREATE INDEX "uploads_expires_idx" ON "uploads" USING btree ("expires_at");--> statement-breakpoint
CREATE INDEX "import_files_sha256_idx" ON "import_files" USING btree ("sha256");