CREATE TABLE "api_tokens" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"user_id" uuid NOT NULL,
	"name" text NOT NULL,
	"token_hash" text NOT NULL,
	"expires_at" timestamp with time zone,
	"revoked_at" timestamp with time zone,
	"last_used_at" timestamp with time zone,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
CREATE TABLE "asset_versions" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"asset_id" uuid NOT NULL,
	"number" integer NOT NULL,
	"take" integer DEFAULT 1 NOT NULL,
	"label" text NOT NULL,
	"record_id" uuid NOT NULL,
	"import_file_id" uuid,
	"created_by" uuid NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "asset_versions_number" CHECK ("asset_versions"."number" >= 0 and "asset_versions"."take" >= 1)
);
--> statement-breakpoint
CREATE TABLE "assets" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"show_id" uuid NOT NULL,
	"code" text NOT NULL,
	"category" text DEFAULT 'other' NOT NULL,
	"outside_id" text,
	"scale" double precision DEFAULT 1 NOT NULL,
	"archived_at" timestamp with time zone,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "assets_code_not_empty" CHECK (length("assets"."code") between 1 and 128),
	CONSTRAINT "assets_category" CHECK ("assets"."category" in ('creature', 'prop', 'costume', 'set', 'vehicle', 'other')),
	CONSTRAINT "assets_scale" CHECK ("assets"."scale" > 0 and "assets"."scale" < 'Infinity')
);
--> statement-breakpoint
CREATE TABLE "audit_events" (
	"id" bigint PRIMARY KEY GENERATED ALWAYS AS IDENTITY (sequence name "audit_events_id_seq" INCREMENT BY 1 MINVALUE 1 MAXVALUE 9223372036854775807 START WITH 1 CACHE 1),
	"show_id" uuid,
	"actor_id" uuid,
	"act" text NOT NULL,
	"origin" text NOT NULL,
	"subject" text NOT NULL,
	"reason" text,
	"items" integer DEFAULT 0 NOT NULL,
	"at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "audit_events_origin" CHECK ("audit_events"."origin" in ('hand', 'rule', 'spreadsheet', 'api', 'import'))
);
--> statement-breakpoint
CREATE TABLE "audit_items" (
	"id" bigint PRIMARY KEY GENERATED ALWAYS AS IDENTITY (sequence name "audit_items_id_seq" INCREMENT BY 1 MINVALUE 1 MAXVALUE 9223372036854775807 START WITH 1 CACHE 1),
	"event_id" bigint NOT NULL,
	"part_id" uuid,
	"field" text NOT NULL,
	"before" text,
	"after" text
);
--> statement-breakpoint
CREATE TABLE "blobs" (
	"sha256" text PRIMARY KEY NOT NULL,
	"byte_size" bigint NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "blobs_sha256_shape" CHECK ("blobs"."sha256" ~ '^[0-9a-f]{64}$'),
	CONSTRAINT "blobs_size" CHECK ("blobs"."byte_size" >= 0)
);
--> statement-breakpoint
CREATE TABLE "findings" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"record_id" uuid NOT NULL,
	"ordinal" integer NOT NULL,
	"code" text NOT NULL,
	"severity" text NOT NULL,
	"message" text NOT NULL,
	"part" text,
	"count" integer NOT NULL,
	"places" jsonb NOT NULL,
	CONSTRAINT "findings_severity" CHECK ("findings"."severity" in ('problem', 'warning', 'note'))
);
--> statement-breakpoint
CREATE TABLE "geometry_components" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"geometry_part_id" uuid NOT NULL,
	"ordinal" integer NOT NULL,
	"faces" integer NOT NULL,
	"volume" double precision NOT NULL,
	"centroid" double precision[] NOT NULL,
	"central_second" double precision[] NOT NULL,
	"area" double precision NOT NULL,
	"surface_centroid" double precision[] NOT NULL,
	"surface_central_second" double precision[] NOT NULL,
	"cage_volume" double precision NOT NULL,
	"cage_centroid" double precision[] NOT NULL,
	"cage_central_second" double precision[] NOT NULL,
	"hollow" double precision[],
	"error_estimate" double precision NOT NULL,
	"surface_error_estimate" double precision NOT NULL,
	CONSTRAINT "geometry_components_volume" CHECK ("geometry_components"."volume" > '-Infinity' and "geometry_components"."volume" < 'Infinity' and "geometry_components"."cage_volume" > '-Infinity' and "geometry_components"."cage_volume" < 'Infinity'),
	CONSTRAINT "geometry_components_area" CHECK ("geometry_components"."area" >= 0 and "geometry_components"."area" < 'Infinity'),
	CONSTRAINT "geometry_components_error" CHECK ("geometry_components"."error_estimate" >= 0 and "geometry_components"."error_estimate" < 'Infinity' and "geometry_components"."surface_error_estimate" >= 0 and "geometry_components"."surface_error_estimate" < 'Infinity'),
	CONSTRAINT "geometry_components_shapes" CHECK (cardinality("geometry_components"."centroid") = 3 and cardinality("geometry_components"."central_second") = 6 and cardinality("geometry_components"."surface_centroid") = 3 and cardinality("geometry_components"."surface_central_second") = 6 and cardinality("geometry_components"."cage_centroid") = 3 and cardinality("geometry_components"."cage_central_second") = 6 and ("geometry_components"."hollow" is null or cardinality("geometry_components"."hollow") = 50)),
	CONSTRAINT "geometry_components_finite" CHECK (not ('NaN'::float8 = any ("geometry_components"."centroid" || "geometry_components"."central_second" || "geometry_components"."surface_centroid" || "geometry_components"."surface_central_second") or 'Infinity'::float8 = any ("geometry_components"."centroid" || "geometry_components"."central_second" || "geometry_components"."surface_centroid" || "geometry_components"."surface_central_second") or '-Infinity'::float8 = any ("geometry_components"."centroid" || "geometry_components"."central_second" || "geometry_components"."surface_centroid" || "geometry_components"."surface_central_second")))
);
--> statement-breakpoint
CREATE TABLE "geometry_parts" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"record_id" uuid NOT NULL,
	"name" text NOT NULL,
	"ordinal" integer NOT NULL,
	"faces" integer NOT NULL,
	"max_valence" integer NOT NULL,
	"open_edges" integer NOT NULL,
	"looks_like_sheet" boolean NOT NULL,
	"cap_area_share" double precision NOT NULL,
	"cap_volume_share" double precision NOT NULL,
	"min_x" double precision NOT NULL,
	"min_y" double precision NOT NULL,
	"min_z" double precision NOT NULL,
	"max_x" double precision NOT NULL,
	"max_y" double precision NOT NULL,
	"max_z" double precision NOT NULL,
	CONSTRAINT "geometry_parts_box" CHECK ("geometry_parts"."min_x" > '-Infinity' and "geometry_parts"."min_x" < 'Infinity' and "geometry_parts"."min_y" > '-Infinity' and "geometry_parts"."min_y" < 'Infinity' and "geometry_parts"."min_z" > '-Infinity' and "geometry_parts"."min_z" < 'Infinity' and "geometry_parts"."max_x" > '-Infinity' and "geometry_parts"."max_x" < 'Infinity' and "geometry_parts"."max_y" > '-Infinity' and "geometry_parts"."max_y" < 'Infinity' and "geometry_parts"."max_z" > '-Infinity' and "geometry_parts"."max_z" < 'Infinity' and "geometry_parts"."min_x" <= "geometry_parts"."max_x" and "geometry_parts"."min_y" <= "geometry_parts"."max_y" and "geometry_parts"."min_z" <= "geometry_parts"."max_z"),
	CONSTRAINT "geometry_parts_caps" CHECK ("geometry_parts"."cap_area_share" >= 0 and "geometry_parts"."cap_area_share" < 'Infinity' and "geometry_parts"."cap_volume_share" >= 0 and "geometry_parts"."cap_volume_share" < 'Infinity')
);
--> statement-breakpoint
CREATE TABLE "geometry_records" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"content_sha256" text NOT NULL,
	"scheme" text NOT NULL,
	"boundary" text NOT NULL,
	"triangles" text NOT NULL,
	"creasing" text NOT NULL,
	"parts_by" text NOT NULL,
	"engine_version" text NOT NULL,
	"faces" integer NOT NULL,
	"vertices" integer NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "geometry_records_scheme" CHECK ("geometry_records"."scheme" in ('catmull-clark', 'loop', 'doo-sabin', 'polyhedral')),
	CONSTRAINT "geometry_records_boundary" CHECK ("geometry_records"."boundary" in ('edge-and-corner', 'edge-only')),
	CONSTRAINT "geometry_records_triangles" CHECK ("geometry_records"."triangles" in ('catmark', 'smooth')),
	CONSTRAINT "geometry_records_creasing" CHECK ("geometry_records"."creasing" in ('uniform', 'chaikin')),
	CONSTRAINT "geometry_records_parts_by" CHECK ("geometry_records"."parts_by" in ('group', 'object', 'material', 'piece', 'joint', 'whole'))
);
--> statement-breakpoint
CREATE TABLE "idempotency_keys" (
	"user_id" uuid NOT NULL,
	"key" text NOT NULL,
	"request_hash" text NOT NULL,
	"status" integer,
	"body" jsonb,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "idempotency_keys_user_id_key_pk" PRIMARY KEY("user_id","key")
);
--> statement-breakpoint
CREATE TABLE "import_files" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"import_id" uuid NOT NULL,
	"name" text NOT NULL,
	"state" text DEFAULT 'queued' NOT NULL,
	"sha256" text NOT NULL,
	"byte_size" bigint NOT NULL,
	"asset_override" text,
	"version_override" integer,
	"outside_id_override" text,
	"category_override" text,
	"asset_id" uuid,
	"version_id" uuid,
	"parts" integer,
	"problems" integer,
	"remark" text,
	"error_code" text,
	"error_message" text,
	"error_line" integer,
	"error_column" integer,
	"attempts" integer DEFAULT 0 NOT NULL,
	"lease_until" timestamp with time zone,
	"lease_by" uuid,
	"uploaded_at" timestamp with time zone DEFAULT now() NOT NULL,
	"ended_at" timestamp with time zone,
	CONSTRAINT "import_files_state" CHECK ("import_files"."state" in ('queued', 'reading', 'measuring', 'done', 'failed')),
	CONSTRAINT "import_files_end" CHECK (("import_files"."state" in ('done', 'failed')) = ("import_files"."ended_at" is not null)),
	CONSTRAINT "import_files_error" CHECK (("import_files"."state" = 'failed') = ("import_files"."error_code" is not null))
);
--> statement-breakpoint
CREATE TABLE "imports" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"show_id" uuid NOT NULL,
	"state" text DEFAULT 'open' NOT NULL,
	"scheme" text NOT NULL,
	"boundary" text NOT NULL,
	"triangles" text DEFAULT 'catmark' NOT NULL,
	"creasing" text DEFAULT 'uniform' NOT NULL,
	"parts_by" text NOT NULL,
	"created_by" uuid NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"submitted_at" timestamp with time zone,
	"ended_at" timestamp with time zone,
	CONSTRAINT "imports_state" CHECK ("imports"."state" in ('open', 'queued', 'running', 'done', 'cancelled')),
	CONSTRAINT "imports_scheme" CHECK ("imports"."scheme" in ('catmull-clark', 'loop', 'doo-sabin', 'polyhedral')),
	CONSTRAINT "imports_boundary" CHECK ("imports"."boundary" in ('edge-and-corner', 'edge-only')),
	CONSTRAINT "imports_parts_by" CHECK ("imports"."parts_by" in ('group', 'object', 'material', 'piece', 'joint', 'whole'))
);
--> statement-breakpoint
CREATE TABLE "mails" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"to_email" text NOT NULL,
	"subject" text NOT NULL,
	"text" text NOT NULL,
	"html" text NOT NULL,
	"state" text DEFAULT 'waiting' NOT NULL,
	"error" text,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"sent_at" timestamp with time zone,
	CONSTRAINT "mails_state" CHECK ("mails"."state" in ('waiting', 'sent', 'local', 'failed'))
);
--> statement-breakpoint
CREATE TABLE "materials" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"show_id" uuid,
	"name" text NOT NULL,
	"category" text NOT NULL,
	"density_kg_m3" double precision,
	"areal_density_kg_m2" double precision,
	"low" double precision,
	"high" double precision,
	"source" text NOT NULL,
	"from_memory" boolean NOT NULL,
	"revision" integer DEFAULT 1 NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "materials_one_density" CHECK (num_nonnulls("materials"."density_kg_m3", "materials"."areal_density_kg_m2") = 1),
	CONSTRAINT "materials_positive" CHECK (coalesce("materials"."density_kg_m3", "materials"."areal_density_kg_m2") > 0 and coalesce("materials"."density_kg_m3", "materials"."areal_density_kg_m2") < 'Infinity')
);
--> statement-breakpoint
CREATE TABLE "members" (
	"show_id" uuid NOT NULL,
	"user_id" uuid NOT NULL,
	"role" text NOT NULL,
	"shots" text[] DEFAULT '{}' NOT NULL,
	"assets" text[] DEFAULT '{}' NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "members_show_id_user_id_pk" PRIMARY KEY("show_id","user_id"),
	CONSTRAINT "members_role" CHECK ("members"."role" in ('lead', 'td', 'artist', 'guest'))
);
--> statement-breakpoint
CREATE TABLE "one_time_links" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"user_id" uuid NOT NULL,
	"purpose" text NOT NULL,
	"token_hash" text NOT NULL,
	"expires_at" timestamp with time zone NOT NULL,
	"used_at" timestamp with time zone,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "one_time_links_purpose" CHECK ("one_time_links"."purpose" in ('invite', 'reset'))
);
--> statement-breakpoint
CREATE TABLE "part_current" (
	"part_id" uuid PRIMARY KEY NOT NULL,
	"show_id" uuid NOT NULL,
	"asset_id" uuid NOT NULL,
	"version_id" uuid NOT NULL,
	"geometry_part_id" uuid,
	"setting_id" bigint,
	"asset" text NOT NULL,
	"outside_id" text,
	"category" text NOT NULL,
	"version" text NOT NULL,
	"row" text DEFAULT 'part' NOT NULL,
	"part" text NOT NULL,
	"body" text,
	"joint" text,
	"variant" text,
	"scale" double precision NOT NULL,
	"construction" text NOT NULL,
	"material" text,
	"density_kg_m3" double precision,
	"areal_density_kg_m2" double precision,
	"wall_m" double precision,
	"target_mass_kg" double precision,
	"area_m2" double precision,
	"volume_m3" double precision,
	"mass_kg" double precision,
	"com_x_m" double precision,
	"com_y_m" double precision,
	"com_z_m" double precision,
	"ixx_kg_m2" double precision,
	"iyy_kg_m2" double precision,
	"izz_kg_m2" double precision,
	"ixy_kg_m2" double precision,
	"ixz_kg_m2" double precision,
	"iyz_kg_m2" double precision,
	"i1_kg_m2" double precision,
	"i2_kg_m2" double precision,
	"i3_kg_m2" double precision,
	"axes_quat_w" double precision,
	"axes_quat_x" double precision,
	"axes_quat_y" double precision,
	"axes_quat_z" double precision,
	"free_axes" text DEFAULT '' NOT NULL,
	"space" text NOT NULL,
	"up_axis" text NOT NULL,
	"numeric_error" double precision,
	"adjusted" text,
	"warnings" text DEFAULT '' NOT NULL,
	"state" text NOT NULL,
	"value_id" uuid,
	"value_sha256" text,
	"revision" integer DEFAULT 1 NOT NULL,
	"changed_revision" bigint NOT NULL,
	"problem_codes" text[] DEFAULT '{}' NOT NULL,
	"mass_source" text,
	"set_by" text,
	"set_from" text,
	"set_at" timestamp with time zone,
	"bounds_m" double precision[],
	"cage_volume_m3" double precision,
	"faces" integer NOT NULL,
	"max_valence" integer NOT NULL,
	"updated_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "part_current_row" CHECK ("part_current"."row" in ('part', 'body', 'added')),
	CONSTRAINT "part_current_state" CHECK ("part_current"."state" in ('approved', 'measured', 'outdated', 'unset', 'blocked', 'left_out')),
	CONSTRAINT "part_current_construction" CHECK ("part_current"."construction" in ('solid', 'hollow', 'sheet')),
	CONSTRAINT "part_current_free_axes" CHECK ("part_current"."free_axes" in ('', '12', '23', '123')),
	CONSTRAINT "part_current_mass" CHECK ("part_current"."mass_kg" > 0 and "part_current"."mass_kg" < 'Infinity'),
	CONSTRAINT "part_current_density" CHECK ("part_current"."density_kg_m3" > 0 and "part_current"."density_kg_m3" < 'Infinity'),
	CONSTRAINT "part_current_areal_density" CHECK ("part_current"."areal_density_kg_m2" > 0 and "part_current"."areal_density_kg_m2" < 'Infinity'),
	CONSTRAINT "part_current_wall" CHECK ("part_current"."wall_m" > 0 and "part_current"."wall_m" < 'Infinity'),
	CONSTRAINT "part_current_target" CHECK ("part_current"."target_mass_kg" > 0 and "part_current"."target_mass_kg" < 'Infinity'),
	CONSTRAINT "part_current_area" CHECK ("part_current"."area_m2" >= 0 and "part_current"."area_m2" < 'Infinity'),
	CONSTRAINT "part_current_volume" CHECK ("part_current"."volume_m3" > 0 and "part_current"."volume_m3" < 'Infinity'),
	CONSTRAINT "part_current_error" CHECK ("part_current"."numeric_error" >= 0 and "part_current"."numeric_error" < 'Infinity'),
	CONSTRAINT "part_current_com_finite" CHECK (abs("part_current"."com_x_m") < 'Infinity' and abs("part_current"."com_y_m") < 'Infinity' and abs("part_current"."com_z_m") < 'Infinity'),
	CONSTRAINT "part_current_inertia_finite" CHECK (abs("part_current"."ixx_kg_m2") < 'Infinity' and abs("part_current"."iyy_kg_m2") < 'Infinity' and abs("part_current"."izz_kg_m2") < 'Infinity' and abs("part_current"."ixy_kg_m2") < 'Infinity' and abs("part_current"."ixz_kg_m2") < 'Infinity' and abs("part_current"."iyz_kg_m2") < 'Infinity'),
	CONSTRAINT "part_current_moments" CHECK ("part_current"."i1_kg_m2" >= 0 and "part_current"."i1_kg_m2" <= "part_current"."i2_kg_m2" and "part_current"."i2_kg_m2" <= "part_current"."i3_kg_m2" and "part_current"."i3_kg_m2" > 0 and "part_current"."i3_kg_m2" < 'Infinity' and "part_current"."i1_kg_m2" + "part_current"."i2_kg_m2" >= "part_current"."i3_kg_m2" - 1e-13 * "part_current"."i3_kg_m2"),
	CONSTRAINT "part_current_quaternion" CHECK ("part_current"."axes_quat_w" >= 0 and abs("part_current"."axes_quat_w" * "part_current"."axes_quat_w" + "part_current"."axes_quat_x" * "part_current"."axes_quat_x" + "part_current"."axes_quat_y" * "part_current"."axes_quat_y" + "part_current"."axes_quat_z" * "part_current"."axes_quat_z" - 1) < 1e-12),
	CONSTRAINT "part_current_all_or_none" CHECK (num_nulls("part_current"."mass_kg", "part_current"."com_x_m", "part_current"."com_y_m", "part_current"."com_z_m", "part_current"."ixx_kg_m2", "part_current"."iyy_kg_m2", "part_current"."izz_kg_m2", "part_current"."ixy_kg_m2", "part_current"."ixz_kg_m2", "part_current"."iyz_kg_m2", "part_current"."i1_kg_m2", "part_current"."i2_kg_m2", "part_current"."i3_kg_m2", "part_current"."axes_quat_w", "part_current"."axes_quat_x", "part_current"."axes_quat_y", "part_current"."axes_quat_z", "part_current"."value_sha256") in (0, 18)),
	CONSTRAINT "part_current_state_fits" CHECK (("part_current"."state" in ('unset', 'blocked', 'left_out')) = ("part_current"."mass_kg" is null))
);
--> statement-breakpoint
CREATE TABLE "parts" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"asset_id" uuid NOT NULL,
	"name" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "parts_name_not_empty" CHECK (length("parts"."name") > 0)
);
--> statement-breakpoint
CREATE TABLE "receipts" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"show_id" uuid NOT NULL,
	"user_id" uuid NOT NULL,
	"token_id" uuid,
	"format" text NOT NULL,
	"selection" text NOT NULL,
	"rows" integer NOT NULL,
	"byte_size" bigint NOT NULL,
	"sha256" text NOT NULL,
	"day" date NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "receipts_sha256_shape" CHECK ("receipts"."sha256" ~ '^[0-9a-f]{64}$')
);
--> statement-breakpoint
CREATE TABLE "settings" (
	"id" bigint PRIMARY KEY GENERATED ALWAYS AS IDENTITY (sequence name "settings_id_seq" INCREMENT BY 1 MINVALUE 1 MAXVALUE 9223372036854775807 START WITH 1 CACHE 1),
	"part_id" uuid NOT NULL,
	"construction" text DEFAULT 'solid' NOT NULL,
	"target_mass_kg" double precision,
	"density_kg_m3" double precision,
	"material_id" uuid,
	"material_revision" integer,
	"areal_density_kg_m2" double precision,
	"wall_m" double precision,
	"variant" text,
	"left_out" boolean DEFAULT false NOT NULL,
	"set_by" uuid NOT NULL,
	"set_from" text NOT NULL,
	"set_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "settings_construction" CHECK ("settings"."construction" in ('solid', 'hollow', 'sheet')),
	CONSTRAINT "settings_set_from" CHECK ("settings"."set_from" in ('hand', 'rule', 'spreadsheet', 'api', 'import')),
	CONSTRAINT "settings_target_mass" CHECK ("settings"."target_mass_kg" > 0 and "settings"."target_mass_kg" < 'Infinity'),
	CONSTRAINT "settings_density" CHECK ("settings"."density_kg_m3" > 0 and "settings"."density_kg_m3" < 'Infinity'),
	CONSTRAINT "settings_areal_density" CHECK ("settings"."areal_density_kg_m2" > 0 and "settings"."areal_density_kg_m2" < 'Infinity'),
	CONSTRAINT "settings_wall" CHECK ("settings"."wall_m" > 0 and "settings"."wall_m" < 'Infinity'),
	CONSTRAINT "settings_material_revision" CHECK (("settings"."material_id" is null) = ("settings"."material_revision" is null))
);
--> statement-breakpoint
CREATE TABLE "shows" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"code" text NOT NULL,
	"title" text NOT NULL,
	"linear_unit" text NOT NULL,
	"up_axis" text NOT NULL,
	"scheme" text NOT NULL,
	"boundary" text DEFAULT 'edge-and-corner' NOT NULL,
	"parts_by" text DEFAULT 'group' NOT NULL,
	"name_pattern" text,
	"self_approval" boolean DEFAULT false NOT NULL,
	"frozen_at" timestamp with time zone,
	"archived_at" timestamp with time zone,
	"revision" bigint DEFAULT 0 NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "shows_code_shape" CHECK ("shows"."code" ~ '^[A-Za-z0-9][A-Za-z0-9_-]{0,31}$'),
	CONSTRAINT "shows_linear_unit" CHECK ("shows"."linear_unit" in ('mm', 'cm', 'dm', 'm', 'in', 'ft')),
	CONSTRAINT "shows_up_axis" CHECK ("shows"."up_axis" in ('y', 'z')),
	CONSTRAINT "shows_scheme" CHECK ("shows"."scheme" in ('catmull-clark', 'loop', 'doo-sabin', 'polyhedral')),
	CONSTRAINT "shows_boundary" CHECK ("shows"."boundary" in ('edge-and-corner', 'edge-only')),
	CONSTRAINT "shows_parts_by" CHECK ("shows"."parts_by" in ('group', 'object', 'material', 'piece', 'joint', 'whole'))
);
--> statement-breakpoint
CREATE TABLE "sign_in_attempts" (
	"id" bigint PRIMARY KEY GENERATED ALWAYS AS IDENTITY (sequence name "sign_in_attempts_id_seq" INCREMENT BY 1 MINVALUE 1 MAXVALUE 9223372036854775807 START WITH 1 CACHE 1),
	"email" text NOT NULL,
	"succeeded" boolean NOT NULL,
	"at" timestamp with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
CREATE TABLE "users" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"email" text NOT NULL,
	"name" text NOT NULL,
	"password_hash" text,
	"is_admin" boolean DEFAULT false NOT NULL,
	"session_epoch" integer DEFAULT 0 NOT NULL,
	"disabled_at" timestamp with time zone,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "users_email_shape" CHECK ("users"."email" ~ '^[^@[:space:]]+@[^@[:space:]]+$')
);
--> statement-breakpoint
ALTER TABLE "api_tokens" ADD CONSTRAINT "api_tokens_user_id_users_id_fk" FOREIGN KEY ("user_id") REFERENCES "public"."users"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "asset_versions" ADD CONSTRAINT "asset_versions_asset_id_assets_id_fk" FOREIGN KEY ("asset_id") REFERENCES "public"."assets"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "asset_versions" ADD CONSTRAINT "asset_versions_record_id_geometry_records_id_fk" FOREIGN KEY ("record_id") REFERENCES "public"."geometry_records"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "asset_versions" ADD CONSTRAINT "asset_versions_import_file_id_import_files_id_fk" FOREIGN KEY ("import_file_id") REFERENCES "public"."import_files"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "asset_versions" ADD CONSTRAINT "asset_versions_created_by_users_id_fk" FOREIGN KEY ("created_by") REFERENCES "public"."users"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "assets" ADD CONSTRAINT "assets_show_id_shows_id_fk" FOREIGN KEY ("show_id") REFERENCES "public"."shows"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "audit_events" ADD CONSTRAINT "audit_events_show_id_shows_id_fk" FOREIGN KEY ("show_id") REFERENCES "public"."shows"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "audit_events" ADD CONSTRAINT "audit_events_actor_id_users_id_fk" FOREIGN KEY ("actor_id") REFERENCES "public"."users"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "audit_items" ADD CONSTRAINT "audit_items_event_id_audit_events_id_fk" FOREIGN KEY ("event_id") REFERENCES "public"."audit_events"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "audit_items" ADD CONSTRAINT "audit_items_part_id_parts_id_fk" FOREIGN KEY ("part_id") REFERENCES "public"."parts"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "findings" ADD CONSTRAINT "findings_record_id_geometry_records_id_fk" FOREIGN KEY ("record_id") REFERENCES "public"."geometry_records"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "geometry_components" ADD CONSTRAINT "geometry_components_geometry_part_id_geometry_parts_id_fk" FOREIGN KEY ("geometry_part_id") REFERENCES "public"."geometry_parts"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "geometry_parts" ADD CONSTRAINT "geometry_parts_record_id_geometry_records_id_fk" FOREIGN KEY ("record_id") REFERENCES "public"."geometry_records"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "idempotency_keys" ADD CONSTRAINT "idempotency_keys_user_id_users_id_fk" FOREIGN KEY ("user_id") REFERENCES "public"."users"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "import_files" ADD CONSTRAINT "import_files_import_id_imports_id_fk" FOREIGN KEY ("import_id") REFERENCES "public"."imports"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "import_files" ADD CONSTRAINT "import_files_sha256_blobs_sha256_fk" FOREIGN KEY ("sha256") REFERENCES "public"."blobs"("sha256") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "import_files" ADD CONSTRAINT "import_files_asset_id_assets_id_fk" FOREIGN KEY ("asset_id") REFERENCES "public"."assets"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "import_files" ADD CONSTRAINT "import_files_version_id_asset_versions_id_fk" FOREIGN KEY ("version_id") REFERENCES "public"."asset_versions"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "imports" ADD CONSTRAINT "imports_show_id_shows_id_fk" FOREIGN KEY ("show_id") REFERENCES "public"."shows"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "imports" ADD CONSTRAINT "imports_created_by_users_id_fk" FOREIGN KEY ("created_by") REFERENCES "public"."users"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "materials" ADD CONSTRAINT "materials_show_id_shows_id_fk" FOREIGN KEY ("show_id") REFERENCES "public"."shows"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "members" ADD CONSTRAINT "members_show_id_shows_id_fk" FOREIGN KEY ("show_id") REFERENCES "public"."shows"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "members" ADD CONSTRAINT "members_user_id_users_id_fk" FOREIGN KEY ("user_id") REFERENCES "public"."users"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "one_time_links" ADD CONSTRAINT "one_time_links_user_id_users_id_fk" FOREIGN KEY ("user_id") REFERENCES "public"."users"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "part_current" ADD CONSTRAINT "part_current_part_id_parts_id_fk" FOREIGN KEY ("part_id") REFERENCES "public"."parts"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "part_current" ADD CONSTRAINT "part_current_show_id_shows_id_fk" FOREIGN KEY ("show_id") REFERENCES "public"."shows"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "part_current" ADD CONSTRAINT "part_current_asset_id_assets_id_fk" FOREIGN KEY ("asset_id") REFERENCES "public"."assets"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "part_current" ADD CONSTRAINT "part_current_version_id_asset_versions_id_fk" FOREIGN KEY ("version_id") REFERENCES "public"."asset_versions"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "part_current" ADD CONSTRAINT "part_current_geometry_part_id_geometry_parts_id_fk" FOREIGN KEY ("geometry_part_id") REFERENCES "public"."geometry_parts"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "part_current" ADD CONSTRAINT "part_current_setting_id_settings_id_fk" FOREIGN KEY ("setting_id") REFERENCES "public"."settings"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "parts" ADD CONSTRAINT "parts_asset_id_assets_id_fk" FOREIGN KEY ("asset_id") REFERENCES "public"."assets"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "receipts" ADD CONSTRAINT "receipts_show_id_shows_id_fk" FOREIGN KEY ("show_id") REFERENCES "public"."shows"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "receipts" ADD CONSTRAINT "receipts_user_id_users_id_fk" FOREIGN KEY ("user_id") REFERENCES "public"."users"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "receipts" ADD CONSTRAINT "receipts_token_id_api_tokens_id_fk" FOREIGN KEY ("token_id") REFERENCES "public"."api_tokens"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "settings" ADD CONSTRAINT "settings_part_id_parts_id_fk" FOREIGN KEY ("part_id") REFERENCES "public"."parts"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "settings" ADD CONSTRAINT "settings_material_id_materials_id_fk" FOREIGN KEY ("material_id") REFERENCES "public"."materials"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "settings" ADD CONSTRAINT "settings_set_by_users_id_fk" FOREIGN KEY ("set_by") REFERENCES "public"."users"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
CREATE UNIQUE INDEX "api_tokens_hash_key" ON "api_tokens" USING btree ("token_hash");--> statement-breakpoint
CREATE INDEX "api_tokens_user_idx" ON "api_tokens" USING btree ("user_id");--> statement-breakpoint
CREATE UNIQUE INDEX "asset_versions_number_take_key" ON "asset_versions" USING btree ("asset_id","number","take");--> statement-breakpoint
CREATE UNIQUE INDEX "assets_show_code_key" ON "assets" USING btree ("show_id","code");--> statement-breakpoint
CREATE INDEX "audit_events_show_idx" ON "audit_events" USING btree ("show_id","id");--> statement-breakpoint
CREATE INDEX "audit_items_event_idx" ON "audit_items" USING btree ("event_id");--> statement-breakpoint
CREATE INDEX "audit_items_part_idx" ON "audit_items" USING btree ("part_id","id");--> statement-breakpoint
CREATE INDEX "findings_record_part_idx" ON "findings" USING btree ("record_id","part");--> statement-breakpoint
CREATE INDEX "findings_code_idx" ON "findings" USING btree ("code");--> statement-breakpoint
CREATE UNIQUE INDEX "geometry_components_part_ordinal_key" ON "geometry_components" USING btree ("geometry_part_id","ordinal");--> statement-breakpoint
CREATE UNIQUE INDEX "geometry_parts_record_name_key" ON "geometry_parts" USING btree ("record_id","name");--> statement-breakpoint
CREATE UNIQUE INDEX "geometry_records_key" ON "geometry_records" USING btree ("content_sha256","scheme","boundary","triangles","creasing","parts_by","engine_version");--> statement-breakpoint
CREATE UNIQUE INDEX "import_files_import_name_key" ON "import_files" USING btree ("import_id","name");--> statement-breakpoint
CREATE INDEX "import_files_open_idx" ON "import_files" USING btree ("import_id","state") WHERE state in ('queued', 'reading', 'measuring');--> statement-breakpoint
CREATE INDEX "imports_show_idx" ON "imports" USING btree ("show_id","created_at");--> statement-breakpoint
CREATE INDEX "mails_created_idx" ON "mails" USING btree ("created_at");--> statement-breakpoint
CREATE UNIQUE INDEX "materials_scope_name_key" ON "materials" USING btree (coalesce("show_id", '00000000-0000-0000-0000-000000000000'::uuid),lower("name"));--> statement-breakpoint
CREATE INDEX "members_user_idx" ON "members" USING btree ("user_id");--> statement-breakpoint
CREATE UNIQUE INDEX "one_time_links_token_key" ON "one_time_links" USING btree ("token_hash");--> statement-breakpoint
CREATE INDEX "one_time_links_user_idx" ON "one_time_links" USING btree ("user_id");--> statement-breakpoint
CREATE INDEX "part_current_order_idx" ON "part_current" USING btree ("show_id","asset","part");--> statement-breakpoint
CREATE INDEX "part_current_state_idx" ON "part_current" USING btree ("show_id","state");--> statement-breakpoint
CREATE INDEX "part_current_asset_idx" ON "part_current" USING btree ("asset_id");--> statement-breakpoint
CREATE INDEX "part_current_changed_idx" ON "part_current" USING btree ("show_id","changed_revision");--> statement-breakpoint
CREATE UNIQUE INDEX "part_current_asset_part_key" ON "part_current" USING btree ("asset_id","part");--> statement-breakpoint
CREATE UNIQUE INDEX "parts_asset_name_key" ON "parts" USING btree ("asset_id","name");--> statement-breakpoint
CREATE INDEX "receipts_show_idx" ON "receipts" USING btree ("show_id","created_at");--> statement-breakpoint
CREATE UNIQUE INDEX "receipts_token_day_key" ON "receipts" USING btree ("token_id","show_id","format","selection","sha256","day") WHERE token_id is not null;--> statement-breakpoint
CREATE INDEX "settings_part_idx" ON "settings" USING btree ("part_id","id");--> statement-breakpoint
CREATE UNIQUE INDEX "shows_code_key" ON "shows" USING btree (lower("code"));--> statement-breakpoint
CREATE INDEX "sign_in_attempts_email_idx" ON "sign_in_attempts" USING btree ("email","at");--> statement-breakpoint
CREATE UNIQUE INDEX "users_email_key" ON "users" USING btree (lower("email"));