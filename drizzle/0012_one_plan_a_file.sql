ALTER TABLE "import_files" DROP COLUMN "planned_asset";--> statement-breakpoint
ALTER TABLE "import_files" DROP COLUMN "planned_version";--> statement-breakpoint
ALTER TABLE "import_files" DROP COLUMN "planned_category";--> statement-breakpoint
ALTER TABLE "import_files" DROP COLUMN "planned_qualified";