ALTER TABLE "import_files" ADD COLUMN "error_excerpt" text;--> statement-breakpoint
ALTER TABLE "import_files" ADD COLUMN "changed" bigint DEFAULT pg_current_xact_id()::text::bigint NOT NULL;--> statement-breakpoint
ALTER TABLE "imports" ADD COLUMN "watched_at" timestamp with time zone;--> statement-breakpoint
CREATE INDEX "import_files_changed_idx" ON "import_files" USING btree ("import_id","changed");--> statement-breakpoint
CREATE FUNCTION public.note_import_file_change() RETURNS trigger LANGUAGE plpgsql SET search_path = pg_catalog AS $$
begin
  new.changed := pg_current_xact_id()::text::bigint;
  return new;
end $$;--> statement-breakpoint
CREATE TRIGGER import_files_changed BEFORE UPDATE OF name, state, sha256, byte_size, asset_override, asset_id, version_id, parts, problems, remark, error_code, error_message, error_line, error_column, error_excerpt ON "import_files" FOR EACH ROW EXECUTE FUNCTION public.note_import_file_change();
