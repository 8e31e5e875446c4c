CREATE TABLE "file_faults" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"import_file_id" uuid NOT NULL,
	"at" timestamp with time zone DEFAULT now() NOT NULL,
	"attempt" integer NOT NULL,
	"worker" text,
	"code" text NOT NULL,
	"message" text NOT NULL,
	"again_at" timestamp with time zone
);
--> statement-breakpoint
CREATE TABLE "queue_turns" (
	"show_id" uuid NOT NULL,
	"lane" text NOT NULL,
	"began" bigint NOT NULL,
	"ended" bigint NOT NULL,
	CONSTRAINT "queue_turns_show_id_lane_pk" PRIMARY KEY("show_id","lane"),
	CONSTRAINT "queue_turns_lane" CHECK ("queue_turns"."lane" in ('all', 'small', 'large'))
);
--> statement-breakpoint
CREATE TABLE "workers" (
	"id" uuid PRIMARY KEY NOT NULL,
	"name" text NOT NULL,
	"threads" integer NOT NULL,
	"memory_bytes" bigint NOT NULL,
	"started_at" timestamp with time zone DEFAULT now() NOT NULL,
	"seen_at" timestamp with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
ALTER TABLE "import_files" ADD COLUMN "planned_asset" text;--> statement-breakpoint
ALTER TABLE "import_files" ADD COLUMN "planned_version" integer;--> statement-breakpoint
ALTER TABLE "import_files" ADD COLUMN "planned_category" text;--> statement-breakpoint
ALTER TABLE "import_files" ADD COLUMN "planned_qualified" boolean DEFAULT false NOT NULL;--> statement-breakpoint
ALTER TABLE "import_files" ADD COLUMN "ordinal" integer;--> statement-breakpoint
ALTER TABLE "import_files" ADD COLUMN "queued_at" timestamp with time zone;--> statement-breakpoint
ALTER TABLE "import_files" ADD COLUMN "faces" integer;--> statement-breakpoint
ALTER TABLE "import_files" ADD COLUMN "try_after" timestamp with time zone;--> statement-breakpoint
ALTER TABLE "import_files" ADD COLUMN "is_alone" boolean DEFAULT false NOT NULL;--> statement-breakpoint
ALTER TABLE "import_files" ADD COLUMN "worker" text;--> statement-breakpoint
ALTER TABLE "import_files" ADD COLUMN "started_at" timestamp with time zone;--> statement-breakpoint
ALTER TABLE "imports" ADD COLUMN "paused_at" timestamp with time zone;--> statement-breakpoint
ALTER TABLE "file_faults" ADD CONSTRAINT "file_faults_import_file_id_import_files_id_fk" FOREIGN KEY ("import_file_id") REFERENCES "public"."import_files"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "queue_turns" ADD CONSTRAINT "queue_turns_show_id_shows_id_fk" FOREIGN KEY ("show_id") REFERENCES "public"."shows"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
CREATE INDEX "file_faults_file_idx" ON "file_faults" USING btree ("import_file_id","at");--> statement-breakpoint
CREATE INDEX "import_files_waiting_idx" ON "import_files" USING btree ("import_id","ordinal") WHERE state in ('queued', 'reading', 'measuring') and queued_at is not null;