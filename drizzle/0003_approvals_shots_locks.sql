CREATE TABLE "approval_requests" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"show_id" uuid NOT NULL,
	"part_id" uuid NOT NULL,
	"value_sha256" text NOT NULL,
	"note" text,
	"asked_by" uuid NOT NULL,
	"asked_at" timestamp with time zone DEFAULT now() NOT NULL,
	"closed_at" timestamp with time zone
);
--> statement-breakpoint
CREATE TABLE "approvals" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"ordinal" bigint GENERATED ALWAYS AS IDENTITY (sequence name "approvals_ordinal_seq" INCREMENT BY 1 MINVALUE 1 MAXVALUE 9223372036854775807 START WITH 1 CACHE 1),
	"show_id" uuid NOT NULL,
	"asset_id" uuid NOT NULL,
	"part_id" uuid NOT NULL,
	"shot_id" uuid,
	"version_id" uuid NOT NULL,
	"geometry_part_id" uuid,
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
	"bounds_m" double precision[],
	"cage_volume_m3" double precision,
	"mass_source" text,
	"value_sha256" text,
	"canonical" text NOT NULL,
	"setter_mark" bigint DEFAULT 0 NOT NULL,
	"faces" integer NOT NULL,
	"max_valence" integer NOT NULL,
	"note" text,
	"carried_from" uuid,
	"approved_by" uuid NOT NULL,
	"approved_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "approvals_row" CHECK ("approvals"."row" in ('part', 'body', 'added')),
	CONSTRAINT "approvals_construction" CHECK ("approvals"."construction" in ('solid', 'hollow', 'sheet')),
	CONSTRAINT "approvals_free_axes" CHECK ("approvals"."free_axes" in ('', '12', '23', '123')),
	CONSTRAINT "approvals_mass" CHECK ("approvals"."mass_kg" > 0 and "approvals"."mass_kg" < 'Infinity'),
	CONSTRAINT "approvals_density" CHECK ("approvals"."density_kg_m3" > 0 and "approvals"."density_kg_m3" < 'Infinity'),
	CONSTRAINT "approvals_areal_density" CHECK ("approvals"."areal_density_kg_m2" > 0 and "approvals"."areal_density_kg_m2" < 'Infinity'),
	CONSTRAINT "approvals_wall" CHECK ("approvals"."wall_m" > 0 and "approvals"."wall_m" < 'Infinity'),
	CONSTRAINT "approvals_target" CHECK ("approvals"."target_mass_kg" > 0 and "approvals"."target_mass_kg" < 'Infinity'),
	CONSTRAINT "approvals_area" CHECK ("approvals"."area_m2" >= 0 and "approvals"."area_m2" < 'Infinity'),
	CONSTRAINT "approvals_volume" CHECK ("approvals"."volume_m3" > 0 and "approvals"."volume_m3" < 'Infinity'),
	CONSTRAINT "approvals_scale" CHECK ("approvals"."scale" > 0 and "approvals"."scale" < 'Infinity'),
	CONSTRAINT "approvals_cage_volume" CHECK ("approvals"."cage_volume_m3" > '-Infinity' and "approvals"."cage_volume_m3" < 'Infinity'),
	CONSTRAINT "approvals_bounds" CHECK (cardinality("approvals"."bounds_m") = 6 and not ('NaN'::float8 = any ("approvals"."bounds_m") or 'Infinity'::float8 = any ("approvals"."bounds_m") or '-Infinity'::float8 = any ("approvals"."bounds_m"))),
	CONSTRAINT "approvals_error" CHECK ("approvals"."numeric_error" >= 0 and "approvals"."numeric_error" < 'Infinity'),
	CONSTRAINT "approvals_com_finite" CHECK (abs("approvals"."com_x_m") < 'Infinity' and abs("approvals"."com_y_m") < 'Infinity' and abs("approvals"."com_z_m") < 'Infinity'),
	CONSTRAINT "approvals_inertia_finite" CHECK (abs("approvals"."ixx_kg_m2") < 'Infinity' and abs("approvals"."iyy_kg_m2") < 'Infinity' and abs("approvals"."izz_kg_m2") < 'Infinity' and abs("approvals"."ixy_kg_m2") < 'Infinity' and abs("approvals"."ixz_kg_m2") < 'Infinity' and abs("approvals"."iyz_kg_m2") < 'Infinity'),
	CONSTRAINT "approvals_moments" CHECK ("approvals"."i1_kg_m2" >= 0 and "approvals"."i1_kg_m2" <= "approvals"."i2_kg_m2" and "approvals"."i2_kg_m2" <= "approvals"."i3_kg_m2" and "approvals"."i3_kg_m2" > 0 and "approvals"."i3_kg_m2" < 'Infinity' and "approvals"."i1_kg_m2" + "approvals"."i2_kg_m2" >= "approvals"."i3_kg_m2" - 1e-13 * "approvals"."i3_kg_m2"),
	CONSTRAINT "approvals_quaternion" CHECK ("approvals"."axes_quat_w" >= 0 and abs("approvals"."axes_quat_w" * "approvals"."axes_quat_w" + "approvals"."axes_quat_x" * "approvals"."axes_quat_x" + "approvals"."axes_quat_y" * "approvals"."axes_quat_y" + "approvals"."axes_quat_z" * "approvals"."axes_quat_z" - 1) < 1e-12),
	CONSTRAINT "approvals_all_or_none" CHECK (num_nulls("approvals"."mass_kg", "approvals"."com_x_m", "approvals"."com_y_m", "approvals"."com_z_m", "approvals"."ixx_kg_m2", "approvals"."iyy_kg_m2", "approvals"."izz_kg_m2", "approvals"."ixy_kg_m2", "approvals"."ixz_kg_m2", "approvals"."iyz_kg_m2", "approvals"."i1_kg_m2", "approvals"."i2_kg_m2", "approvals"."i3_kg_m2", "approvals"."axes_quat_w", "approvals"."axes_quat_x", "approvals"."axes_quat_y", "approvals"."axes_quat_z", "approvals"."value_sha256") in (0, 18)),
	CONSTRAINT "approvals_complete" CHECK ("approvals"."mass_kg" is not null),
	CONSTRAINT "approvals_hash" CHECK ("approvals"."value_sha256" = encode(sha256(convert_to("approvals"."canonical", 'UTF8')), 'hex'))
);
--> statement-breakpoint
CREATE TABLE "lock_claims" (
	"lock_id" uuid NOT NULL,
	"part_id" uuid NOT NULL,
	"shot_id" uuid NOT NULL,
	"copy" text DEFAULT '' NOT NULL,
	"released_at" timestamp with time zone,
	CONSTRAINT "lock_claims_lock_id_part_id_pk" PRIMARY KEY("lock_id","part_id")
);
--> statement-breakpoint
CREATE TABLE "locks" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"show_id" uuid NOT NULL,
	"shot_id" uuid NOT NULL,
	"copy" text DEFAULT '' NOT NULL,
	"asset_id" uuid NOT NULL,
	"part_id" uuid NOT NULL,
	"approval_id" uuid NOT NULL,
	"value_sha256" text NOT NULL,
	"csv_schema" text NOT NULL,
	"cells" text NOT NULL,
	"locked_by" uuid NOT NULL,
	"locked_at" timestamp with time zone DEFAULT now() NOT NULL,
	"unlocked_by" uuid,
	"unlock_reason" text,
	"unlocked_at" timestamp with time zone,
	CONSTRAINT "locks_end" CHECK (num_nulls("locks"."unlocked_at", "locks"."unlocked_by", "locks"."unlock_reason") in (0, 3) and length("locks"."unlock_reason") > 0)
);
--> statement-breakpoint
CREATE TABLE "notices" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"user_id" uuid NOT NULL,
	"show_id" uuid NOT NULL,
	"key" text NOT NULL,
	"text" jsonb NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"mail_id" uuid
);
--> statement-breakpoint
CREATE TABLE "people_told" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"show_id" uuid NOT NULL,
	"user_id" uuid NOT NULL,
	"shot_id" uuid,
	"asset_id" uuid,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "people_told_key" UNIQUE NULLS NOT DISTINCT("show_id","user_id","shot_id","asset_id"),
	CONSTRAINT "people_told_one" CHECK ("people_told"."shot_id" is null or "people_told"."asset_id" is null)
);
--> statement-breakpoint
CREATE TABLE "receipt_rows" (
	"id" bigint PRIMARY KEY GENERATED ALWAYS AS IDENTITY (sequence name "receipt_rows_id_seq" INCREMENT BY 1 MINVALUE 1 MAXVALUE 9223372036854775807 START WITH 1 CACHE 1),
	"receipt_id" uuid NOT NULL,
	"part_id" uuid NOT NULL,
	"lock_id" uuid,
	"value_sha256" text
);
--> statement-breakpoint
CREATE TABLE "shot_assets" (
	"shot_id" uuid NOT NULL,
	"asset_id" uuid NOT NULL,
	"copy" text DEFAULT '' NOT NULL,
	CONSTRAINT "shot_assets_shot_id_asset_id_copy_pk" PRIMARY KEY("shot_id","asset_id","copy"),
	CONSTRAINT "shot_assets_copy_shape" CHECK ("shot_assets"."copy" ~ '^[A-Za-z0-9._-]{0,32}$')
);
--> statement-breakpoint
CREATE TABLE "shot_overrides" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"shot_id" uuid NOT NULL,
	"part_id" uuid NOT NULL,
	"setting_id" bigint NOT NULL,
	"version_id" uuid NOT NULL,
	"geometry_part_id" uuid,
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
	"bounds_m" double precision[],
	"cage_volume_m3" double precision,
	"mass_source" text,
	"value_sha256" text,
	"state" text NOT NULL,
	"canonical" text,
	"value_findings" jsonb DEFAULT '[]'::jsonb NOT NULL,
	"faces" integer NOT NULL,
	"max_valence" integer NOT NULL,
	"reason" text NOT NULL,
	"drafted_by" uuid NOT NULL,
	"drafted_at" timestamp with time zone DEFAULT now() NOT NULL,
	"dropped_by" uuid,
	"dropped_at" timestamp with time zone,
	CONSTRAINT "shot_overrides_row" CHECK ("shot_overrides"."row" in ('part', 'body', 'added')),
	CONSTRAINT "shot_overrides_construction" CHECK ("shot_overrides"."construction" in ('solid', 'hollow', 'sheet')),
	CONSTRAINT "shot_overrides_free_axes" CHECK ("shot_overrides"."free_axes" in ('', '12', '23', '123')),
	CONSTRAINT "shot_overrides_mass" CHECK ("shot_overrides"."mass_kg" > 0 and "shot_overrides"."mass_kg" < 'Infinity'),
	CONSTRAINT "shot_overrides_density" CHECK ("shot_overrides"."density_kg_m3" > 0 and "shot_overrides"."density_kg_m3" < 'Infinity'),
	CONSTRAINT "shot_overrides_areal_density" CHECK ("shot_overrides"."areal_density_kg_m2" > 0 and "shot_overrides"."areal_density_kg_m2" < 'Infinity'),
	CONSTRAINT "shot_overrides_wall" CHECK ("shot_overrides"."wall_m" > 0 and "shot_overrides"."wall_m" < 'Infinity'),
	CONSTRAINT "shot_overrides_target" CHECK ("shot_overrides"."target_mass_kg" > 0 and "shot_overrides"."target_mass_kg" < 'Infinity'),
	CONSTRAINT "shot_overrides_area" CHECK ("shot_overrides"."area_m2" >= 0 and "shot_overrides"."area_m2" < 'Infinity'),
	CONSTRAINT "shot_overrides_volume" CHECK ("shot_overrides"."volume_m3" > 0 and "shot_overrides"."volume_m3" < 'Infinity'),
	CONSTRAINT "shot_overrides_scale" CHECK ("shot_overrides"."scale" > 0 and "shot_overrides"."scale" < 'Infinity'),
	CONSTRAINT "shot_overrides_cage_volume" CHECK ("shot_overrides"."cage_volume_m3" > '-Infinity' and "shot_overrides"."cage_volume_m3" < 'Infinity'),
	CONSTRAINT "shot_overrides_bounds" CHECK (cardinality("shot_overrides"."bounds_m") = 6 and not ('NaN'::float8 = any ("shot_overrides"."bounds_m") or 'Infinity'::float8 = any ("shot_overrides"."bounds_m") or '-Infinity'::float8 = any ("shot_overrides"."bounds_m"))),
	CONSTRAINT "shot_overrides_error" CHECK ("shot_overrides"."numeric_error" >= 0 and "shot_overrides"."numeric_error" < 'Infinity'),
	CONSTRAINT "shot_overrides_com_finite" CHECK (abs("shot_overrides"."com_x_m") < 'Infinity' and abs("shot_overrides"."com_y_m") < 'Infinity' and abs("shot_overrides"."com_z_m") < 'Infinity'),
	CONSTRAINT "shot_overrides_inertia_finite" CHECK (abs("shot_overrides"."ixx_kg_m2") < 'Infinity' and abs("shot_overrides"."iyy_kg_m2") < 'Infinity' and abs("shot_overrides"."izz_kg_m2") < 'Infinity' and abs("shot_overrides"."ixy_kg_m2") < 'Infinity' and abs("shot_overrides"."ixz_kg_m2") < 'Infinity' and abs("shot_overrides"."iyz_kg_m2") < 'Infinity'),
	CONSTRAINT "shot_overrides_moments" CHECK ("shot_overrides"."i1_kg_m2" >= 0 and "shot_overrides"."i1_kg_m2" <= "shot_overrides"."i2_kg_m2" and "shot_overrides"."i2_kg_m2" <= "shot_overrides"."i3_kg_m2" and "shot_overrides"."i3_kg_m2" > 0 and "shot_overrides"."i3_kg_m2" < 'Infinity' and "shot_overrides"."i1_kg_m2" + "shot_overrides"."i2_kg_m2" >= "shot_overrides"."i3_kg_m2" - 1e-13 * "shot_overrides"."i3_kg_m2"),
	CONSTRAINT "shot_overrides_quaternion" CHECK ("shot_overrides"."axes_quat_w" >= 0 and abs("shot_overrides"."axes_quat_w" * "shot_overrides"."axes_quat_w" + "shot_overrides"."axes_quat_x" * "shot_overrides"."axes_quat_x" + "shot_overrides"."axes_quat_y" * "shot_overrides"."axes_quat_y" + "shot_overrides"."axes_quat_z" * "shot_overrides"."axes_quat_z" - 1) < 1e-12),
	CONSTRAINT "shot_overrides_all_or_none" CHECK (num_nulls("shot_overrides"."mass_kg", "shot_overrides"."com_x_m", "shot_overrides"."com_y_m", "shot_overrides"."com_z_m", "shot_overrides"."ixx_kg_m2", "shot_overrides"."iyy_kg_m2", "shot_overrides"."izz_kg_m2", "shot_overrides"."ixy_kg_m2", "shot_overrides"."ixz_kg_m2", "shot_overrides"."iyz_kg_m2", "shot_overrides"."i1_kg_m2", "shot_overrides"."i2_kg_m2", "shot_overrides"."i3_kg_m2", "shot_overrides"."axes_quat_w", "shot_overrides"."axes_quat_x", "shot_overrides"."axes_quat_y", "shot_overrides"."axes_quat_z", "shot_overrides"."value_sha256") in (0, 18)),
	CONSTRAINT "shot_overrides_state" CHECK ("shot_overrides"."state" in ('unset', 'blocked', 'measured')),
	CONSTRAINT "shot_overrides_state_fits" CHECK (("shot_overrides"."state" = 'measured') = ("shot_overrides"."mass_kg" is not null) and ("shot_overrides"."mass_kg" is null) = ("shot_overrides"."canonical" is null)),
	CONSTRAINT "shot_overrides_reason" CHECK (length("shot_overrides"."reason") > 0),
	CONSTRAINT "shot_overrides_dropped" CHECK (("shot_overrides"."dropped_at" is null) = ("shot_overrides"."dropped_by" is null))
);
--> statement-breakpoint
CREATE TABLE "shots" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"show_id" uuid NOT NULL,
	"code" text NOT NULL,
	"sequence" text NOT NULL,
	"title" text,
	"created_by" uuid NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "shots_code_shape" CHECK ("shots"."code" ~ '^[A-Za-z0-9][A-Za-z0-9._-]{0,63}$' and "shots"."sequence" ~ '^[A-Za-z0-9][A-Za-z0-9._-]{0,63}$')
);
--> statement-breakpoint
CREATE TABLE "value_setters" (
	"id" bigint PRIMARY KEY GENERATED ALWAYS AS IDENTITY (sequence name "value_setters_id_seq" INCREMENT BY 1 MINVALUE 1 MAXVALUE 9223372036854775807 START WITH 1 CACHE 1),
	"part_id" uuid NOT NULL,
	"shot_id" uuid,
	"user_id" uuid NOT NULL,
	"act" text NOT NULL,
	"at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "value_setters_act" CHECK ("value_setters"."act" in ('setting', 'version', 'scale', 'material', 'rule'))
);
--> statement-breakpoint
CREATE TABLE "withdrawals" (
	"approval_id" uuid PRIMARY KEY NOT NULL,
	"reason" text NOT NULL,
	"withdrawn_by" uuid NOT NULL,
	"withdrawn_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "withdrawals_reason" CHECK (length("withdrawals"."reason") > 0)
);
--> statement-breakpoint
ALTER TABLE "part_current" ADD COLUMN "last_approval_id" uuid;--> statement-breakpoint
ALTER TABLE "receipts" ADD COLUMN "shot_id" uuid;--> statement-breakpoint
ALTER TABLE "settings" ADD COLUMN "shot_id" uuid;--> statement-breakpoint
ALTER TABLE "settings" ADD COLUMN "reason" text;--> statement-breakpoint
ALTER TABLE "shows" ADD COLUMN "tolerance_mass_percent" double precision DEFAULT 0.5 NOT NULL;--> statement-breakpoint
ALTER TABLE "shows" ADD COLUMN "tolerance_com_percent" double precision DEFAULT 0.5 NOT NULL;--> statement-breakpoint
ALTER TABLE "shows" ADD COLUMN "tolerance_moments_percent" double precision DEFAULT 1 NOT NULL;--> statement-breakpoint
ALTER TABLE "users" ADD COLUMN "mail_choice" text DEFAULT 'at_once' NOT NULL;--> statement-breakpoint
ALTER TABLE "approval_requests" ADD CONSTRAINT "approval_requests_show_id_shows_id_fk" FOREIGN KEY ("show_id") REFERENCES "public"."shows"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "approval_requests" ADD CONSTRAINT "approval_requests_part_id_parts_id_fk" FOREIGN KEY ("part_id") REFERENCES "public"."parts"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "approval_requests" ADD CONSTRAINT "approval_requests_asked_by_users_id_fk" FOREIGN KEY ("asked_by") REFERENCES "public"."users"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "approvals" ADD CONSTRAINT "approvals_show_id_shows_id_fk" FOREIGN KEY ("show_id") REFERENCES "public"."shows"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "approvals" ADD CONSTRAINT "approvals_asset_id_assets_id_fk" FOREIGN KEY ("asset_id") REFERENCES "public"."assets"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "approvals" ADD CONSTRAINT "approvals_part_id_parts_id_fk" FOREIGN KEY ("part_id") REFERENCES "public"."parts"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "approvals" ADD CONSTRAINT "approvals_shot_id_shots_id_fk" FOREIGN KEY ("shot_id") REFERENCES "public"."shots"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "approvals" ADD CONSTRAINT "approvals_version_id_asset_versions_id_fk" FOREIGN KEY ("version_id") REFERENCES "public"."asset_versions"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "approvals" ADD CONSTRAINT "approvals_geometry_part_id_geometry_parts_id_fk" FOREIGN KEY ("geometry_part_id") REFERENCES "public"."geometry_parts"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "approvals" ADD CONSTRAINT "approvals_carried_from_approvals_id_fk" FOREIGN KEY ("carried_from") REFERENCES "public"."approvals"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "approvals" ADD CONSTRAINT "approvals_approved_by_users_id_fk" FOREIGN KEY ("approved_by") REFERENCES "public"."users"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "lock_claims" ADD CONSTRAINT "lock_claims_lock_id_locks_id_fk" FOREIGN KEY ("lock_id") REFERENCES "public"."locks"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "lock_claims" ADD CONSTRAINT "lock_claims_part_id_parts_id_fk" FOREIGN KEY ("part_id") REFERENCES "public"."parts"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "lock_claims" ADD CONSTRAINT "lock_claims_shot_id_shots_id_fk" FOREIGN KEY ("shot_id") REFERENCES "public"."shots"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "locks" ADD CONSTRAINT "locks_show_id_shows_id_fk" FOREIGN KEY ("show_id") REFERENCES "public"."shows"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "locks" ADD CONSTRAINT "locks_shot_id_shots_id_fk" FOREIGN KEY ("shot_id") REFERENCES "public"."shots"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "locks" ADD CONSTRAINT "locks_asset_id_assets_id_fk" FOREIGN KEY ("asset_id") REFERENCES "public"."assets"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "locks" ADD CONSTRAINT "locks_part_id_parts_id_fk" FOREIGN KEY ("part_id") REFERENCES "public"."parts"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "locks" ADD CONSTRAINT "locks_approval_id_approvals_id_fk" FOREIGN KEY ("approval_id") REFERENCES "public"."approvals"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "locks" ADD CONSTRAINT "locks_locked_by_users_id_fk" FOREIGN KEY ("locked_by") REFERENCES "public"."users"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "locks" ADD CONSTRAINT "locks_unlocked_by_users_id_fk" FOREIGN KEY ("unlocked_by") REFERENCES "public"."users"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "notices" ADD CONSTRAINT "notices_user_id_users_id_fk" FOREIGN KEY ("user_id") REFERENCES "public"."users"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "notices" ADD CONSTRAINT "notices_show_id_shows_id_fk" FOREIGN KEY ("show_id") REFERENCES "public"."shows"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "notices" ADD CONSTRAINT "notices_mail_id_mails_id_fk" FOREIGN KEY ("mail_id") REFERENCES "public"."mails"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "people_told" ADD CONSTRAINT "people_told_show_id_shows_id_fk" FOREIGN KEY ("show_id") REFERENCES "public"."shows"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "people_told" ADD CONSTRAINT "people_told_user_id_users_id_fk" FOREIGN KEY ("user_id") REFERENCES "public"."users"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "people_told" ADD CONSTRAINT "people_told_shot_id_shots_id_fk" FOREIGN KEY ("shot_id") REFERENCES "public"."shots"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "people_told" ADD CONSTRAINT "people_told_asset_id_assets_id_fk" FOREIGN KEY ("asset_id") REFERENCES "public"."assets"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "receipt_rows" ADD CONSTRAINT "receipt_rows_receipt_id_receipts_id_fk" FOREIGN KEY ("receipt_id") REFERENCES "public"."receipts"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "receipt_rows" ADD CONSTRAINT "receipt_rows_part_id_parts_id_fk" FOREIGN KEY ("part_id") REFERENCES "public"."parts"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "receipt_rows" ADD CONSTRAINT "receipt_rows_lock_id_locks_id_fk" FOREIGN KEY ("lock_id") REFERENCES "public"."locks"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "shot_assets" ADD CONSTRAINT "shot_assets_shot_id_shots_id_fk" FOREIGN KEY ("shot_id") REFERENCES "public"."shots"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "shot_assets" ADD CONSTRAINT "shot_assets_asset_id_assets_id_fk" FOREIGN KEY ("asset_id") REFERENCES "public"."assets"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "shot_overrides" ADD CONSTRAINT "shot_overrides_shot_id_shots_id_fk" FOREIGN KEY ("shot_id") REFERENCES "public"."shots"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "shot_overrides" ADD CONSTRAINT "shot_overrides_part_id_parts_id_fk" FOREIGN KEY ("part_id") REFERENCES "public"."parts"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "shot_overrides" ADD CONSTRAINT "shot_overrides_setting_id_settings_id_fk" FOREIGN KEY ("setting_id") REFERENCES "public"."settings"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "shot_overrides" ADD CONSTRAINT "shot_overrides_version_id_asset_versions_id_fk" FOREIGN KEY ("version_id") REFERENCES "public"."asset_versions"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "shot_overrides" ADD CONSTRAINT "shot_overrides_geometry_part_id_geometry_parts_id_fk" FOREIGN KEY ("geometry_part_id") REFERENCES "public"."geometry_parts"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "shot_overrides" ADD CONSTRAINT "shot_overrides_drafted_by_users_id_fk" FOREIGN KEY ("drafted_by") REFERENCES "public"."users"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "shot_overrides" ADD CONSTRAINT "shot_overrides_dropped_by_users_id_fk" FOREIGN KEY ("dropped_by") REFERENCES "public"."users"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "shots" ADD CONSTRAINT "shots_show_id_shows_id_fk" FOREIGN KEY ("show_id") REFERENCES "public"."shows"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "shots" ADD CONSTRAINT "shots_created_by_users_id_fk" FOREIGN KEY ("created_by") REFERENCES "public"."users"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "value_setters" ADD CONSTRAINT "value_setters_part_id_parts_id_fk" FOREIGN KEY ("part_id") REFERENCES "public"."parts"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "value_setters" ADD CONSTRAINT "value_setters_shot_id_shots_id_fk" FOREIGN KEY ("shot_id") REFERENCES "public"."shots"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "value_setters" ADD CONSTRAINT "value_setters_user_id_users_id_fk" FOREIGN KEY ("user_id") REFERENCES "public"."users"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "withdrawals" ADD CONSTRAINT "withdrawals_approval_id_approvals_id_fk" FOREIGN KEY ("approval_id") REFERENCES "public"."approvals"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "withdrawals" ADD CONSTRAINT "withdrawals_withdrawn_by_users_id_fk" FOREIGN KEY ("withdrawn_by") REFERENCES "public"."users"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
CREATE INDEX "approval_requests_show_idx" ON "approval_requests" USING btree ("show_id","asked_at");--> statement-breakpoint
CREATE UNIQUE INDEX "approval_requests_open_key" ON "approval_requests" USING btree ("part_id") WHERE closed_at is null;--> statement-breakpoint
CREATE UNIQUE INDEX "approvals_ordinal_key" ON "approvals" USING btree ("ordinal");--> statement-breakpoint
CREATE INDEX "approvals_part_idx" ON "approvals" USING btree ("part_id","ordinal");--> statement-breakpoint
CREATE INDEX "approvals_show_idx" ON "approvals" USING btree ("show_id","ordinal");--> statement-breakpoint
CREATE UNIQUE INDEX "lock_claims_live_key" ON "lock_claims" USING btree ("shot_id","copy","part_id") WHERE released_at is null;--> statement-breakpoint
CREATE UNIQUE INDEX "locks_live_key" ON "locks" USING btree ("shot_id","copy","part_id") WHERE unlocked_at is null;--> statement-breakpoint
CREATE INDEX "locks_shot_idx" ON "locks" USING btree ("shot_id","locked_at");--> statement-breakpoint
CREATE INDEX "locks_part_idx" ON "locks" USING btree ("part_id");--> statement-breakpoint
CREATE INDEX "locks_show_live_idx" ON "locks" USING btree ("show_id") WHERE unlocked_at is null;--> statement-breakpoint
CREATE INDEX "locks_approval_idx" ON "locks" USING btree ("approval_id");--> statement-breakpoint
CREATE UNIQUE INDEX "notices_key" ON "notices" USING btree ("user_id","key");--> statement-breakpoint
CREATE INDEX "notices_waiting_idx" ON "notices" USING btree ("mail_id","created_at");--> statement-breakpoint
CREATE INDEX "people_told_user_idx" ON "people_told" USING btree ("user_id");--> statement-breakpoint
CREATE INDEX "receipt_rows_receipt_idx" ON "receipt_rows" USING btree ("receipt_id");--> statement-breakpoint
CREATE INDEX "receipt_rows_part_idx" ON "receipt_rows" USING btree ("part_id");--> statement-breakpoint
CREATE INDEX "receipt_rows_lock_idx" ON "receipt_rows" USING btree ("lock_id");--> statement-breakpoint
CREATE INDEX "shot_assets_asset_idx" ON "shot_assets" USING btree ("asset_id");--> statement-breakpoint
CREATE UNIQUE INDEX "shot_overrides_standing_key" ON "shot_overrides" USING btree ("shot_id","part_id") WHERE dropped_at is null;--> statement-breakpoint
CREATE INDEX "shot_overrides_part_idx" ON "shot_overrides" USING btree ("part_id");--> statement-breakpoint
CREATE UNIQUE INDEX "shots_show_code_key" ON "shots" USING btree ("show_id",lower("code"));--> statement-breakpoint
CREATE INDEX "shots_sequence_idx" ON "shots" USING btree ("show_id","sequence");--> statement-breakpoint
CREATE INDEX "value_setters_part_idx" ON "value_setters" USING btree ("part_id","id");--> statement-breakpoint
ALTER TABLE "part_current" ADD CONSTRAINT "part_current_value_id_approvals_id_fk" FOREIGN KEY ("value_id") REFERENCES "public"."approvals"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "part_current" ADD CONSTRAINT "part_current_last_approval_id_approvals_id_fk" FOREIGN KEY ("last_approval_id") REFERENCES "public"."approvals"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "receipts" ADD CONSTRAINT "receipts_shot_id_shots_id_fk" FOREIGN KEY ("shot_id") REFERENCES "public"."shots"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "settings" ADD CONSTRAINT "settings_shot_id_shots_id_fk" FOREIGN KEY ("shot_id") REFERENCES "public"."shots"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
CREATE INDEX "receipts_shot_idx" ON "receipts" USING btree ("shot_id","created_at");--> statement-breakpoint
ALTER TABLE "part_current" ADD CONSTRAINT "part_current_approved" CHECK (("part_current"."state" = 'approved') = ("part_current"."value_id" is not null) and ("part_current"."value_id" is null or "part_current"."last_approval_id" is not null));--> statement-breakpoint
ALTER TABLE "settings" ADD CONSTRAINT "settings_shot_reason" CHECK (("settings"."shot_id" is null) = ("settings"."reason" is null));--> statement-breakpoint
ALTER TABLE "shows" ADD CONSTRAINT "shows_tolerances" CHECK ("shows"."tolerance_mass_percent" >= 0 and "shows"."tolerance_mass_percent" < 'Infinity' and "shows"."tolerance_com_percent" >= 0 and "shows"."tolerance_com_percent" < 'Infinity' and "shows"."tolerance_moments_percent" >= 0 and "shows"."tolerance_moments_percent" < 'Infinity');--> statement-breakpoint
ALTER TABLE "users" ADD CONSTRAINT "users_mail_choice" CHECK ("users"."mail_choice" in ('at_once', 'daily', 'none'));--> statement-breakpoint
-- Who set what is there already: every setting's author, and whoever brought in the asset's current version.
INSERT INTO "value_setters" ("part_id", "user_id", "act", "at")
SELECT "part_id", "set_by", 'setting', "set_at" FROM "settings" ORDER BY "id";--> statement-breakpoint
INSERT INTO "value_setters" ("part_id", "user_id", "act", "at")
SELECT c."part_id", v."created_by", 'version', v."created_at" FROM "part_current" c JOIN "asset_versions" v ON v."id" = c."version_id";
