DROP INDEX "part_current_order_idx";--> statement-breakpoint
ALTER TABLE "part_current" ADD COLUMN "value_findings" jsonb DEFAULT '[]'::jsonb NOT NULL;--> statement-breakpoint
CREATE INDEX "part_current_order_c_idx" ON "part_current" USING btree ("show_id","asset" collate "C","part" collate "C");