ALTER TABLE "audit_items" ADD COLUMN "shot_id" uuid;--> statement-breakpoint
ALTER TABLE "users" ADD COLUMN "digest_at" timestamp with time zone;--> statement-breakpoint
ALTER TABLE "audit_items" ADD CONSTRAINT "audit_items_shot_id_shots_id_fk" FOREIGN KEY ("shot_id") REFERENCES "public"."shots"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
CREATE INDEX "audit_items_shot_idx" ON "audit_items" USING btree ("shot_id","event_id");