CREATE SEQUENCE "public"."entry_id_seq" INCREMENT BY 1 MINVALUE 1 MAXVALUE 9223372036854775807 START WITH 1 CACHE 1;--> statement-breakpoint
CREATE TABLE "catalogue" (
	"id" integer PRIMARY KEY GENERATED ALWAYS AS IDENTITY (sequence name "catalogue_id_seq" INCREMENT BY 1 MINVALUE 1 MAXVALUE 2147483647 START WITH 1 CACHE 1),
	"group_id" integer NOT NULL,
	"label" "citext" NOT NULL,
	"title" text NOT NULL,
	"description" text DEFAULT '' NOT NULL,
	"band" text DEFAULT '' NOT NULL,
	"citation" text DEFAULT '' NOT NULL,
	"ordinal" integer NOT NULL,
	"created_by" integer NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "catalogue_label_unique" UNIQUE("group_id","label"),
	CONSTRAINT "catalogue_ordinal_unique" UNIQUE("group_id","ordinal")
);
--> statement-breakpoint
CREATE TABLE "catalogue_revision" (
	"id" integer PRIMARY KEY GENERATED ALWAYS AS IDENTITY (sequence name "catalogue_revision_id_seq" INCREMENT BY 1 MINVALUE 1 MAXVALUE 2147483647 START WITH 1 CACHE 1),
	"group_id" integer NOT NULL,
	"catalogue_id" integer NOT NULL,
	"number" integer NOT NULL,
	"file_id" uuid NOT NULL,
	"dialect" jsonb NOT NULL,
	"mapping" jsonb NOT NULL,
	"columns" jsonb NOT NULL,
	"frame" text NOT NULL,
	"epoch_year" double precision,
	"state" text DEFAULT 'importing' NOT NULL,
	"rows_read" bigint DEFAULT 0 NOT NULL,
	"sources" bigint DEFAULT 0 NOT NULL,
	"set_aside" bigint DEFAULT 0 NOT NULL,
	"median_err_arcsec" double precision,
	"coverage" jsonb,
	"registered_at" timestamp with time zone,
	"job_id" uuid NOT NULL,
	"created_by" integer NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "catalogue_revision_number_unique" UNIQUE("catalogue_id","number")
);
--> statement-breakpoint
CREATE TABLE "entry" (
	"id" bigint NOT NULL,
	"group_id" integer NOT NULL,
	"catalogue_id" integer NOT NULL,
	"key" text NOT NULL,
	CONSTRAINT "entry_id_catalogue_id_pk" PRIMARY KEY("id","catalogue_id"),
	CONSTRAINT "entry_key_unique" UNIQUE("catalogue_id","key")
) PARTITION BY LIST ("catalogue_id");
--> statement-breakpoint
CREATE TABLE "set_aside_row" (
	"group_id" integer NOT NULL,
	"revision_id" integer NOT NULL,
	"seq" integer NOT NULL,
	"line" integer NOT NULL,
	"column" text,
	"code" text NOT NULL,
	"message" text NOT NULL,
	"raw" text NOT NULL,
	CONSTRAINT "set_aside_row_revision_id_seq_pk" PRIMARY KEY("revision_id","seq"),
	CONSTRAINT "set_aside_row_seq" CHECK ("set_aside_row"."seq" >= 0)
);
--> statement-breakpoint
CREATE TABLE "source" (
	"group_id" integer NOT NULL,
	"revision_id" integer NOT NULL,
	"row_no" integer NOT NULL,
	"entry_id" bigint NOT NULL,
	"key" text NOT NULL,
	"designation" text NOT NULL,
	"ra_deg" double precision NOT NULL,
	"dec_deg" double precision NOT NULL,
	"err_maj_arcsec" real,
	"err_min_arcsec" real,
	"err_pa_deg" real,
	"pm_ra_mas_yr" double precision,
	"pm_dec_mas_yr" double precision,
	"cells" text NOT NULL,
	CONSTRAINT "source_revision_id_row_no_pk" PRIMARY KEY("revision_id","row_no")
) PARTITION BY LIST ("revision_id");
--> statement-breakpoint
CREATE TABLE "stored_file" (
	"id" uuid PRIMARY KEY NOT NULL,
	"group_id" integer NOT NULL,
	"name" text NOT NULL,
	"size_bytes" bigint NOT NULL,
	"sha256" text NOT NULL,
	"inspection" jsonb NOT NULL,
	"uploaded_by" integer NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
CREATE TABLE "audit_event" (
	"id" bigint PRIMARY KEY GENERATED ALWAYS AS IDENTITY (sequence name "audit_event_id_seq" INCREMENT BY 1 MINVALUE 1 MAXVALUE 9223372036854775807 START WITH 1 CACHE 1),
	"group_id" integer NOT NULL,
	"person_id" integer,
	"at" timestamp with time zone DEFAULT now() NOT NULL,
	"action" text NOT NULL,
	"subject" text NOT NULL,
	"detail" jsonb DEFAULT '{}'::jsonb NOT NULL
);
--> statement-breakpoint
CREATE TABLE "membership" (
	"group_id" integer NOT NULL,
	"person_id" integer NOT NULL,
	"role" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "membership_group_id_person_id_pk" PRIMARY KEY("group_id","person_id"),
	CONSTRAINT "membership_role_known" CHECK ("membership"."role" in ('reader', 'contributor', 'curator', 'owner'))
);
--> statement-breakpoint
CREATE TABLE "research_group" (
	"id" integer PRIMARY KEY GENERATED ALWAYS AS IDENTITY (sequence name "research_group_id_seq" INCREMENT BY 1 MINVALUE 1 MAXVALUE 2147483647 START WITH 1 CACHE 1),
	"slug" text NOT NULL,
	"name" text NOT NULL,
	"next_object_number" bigint DEFAULT 1 NOT NULL,
	"next_run_number" integer DEFAULT 1 NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "research_group_slug_unique" UNIQUE("slug")
);
--> statement-breakpoint
CREATE TABLE "job" (
	"id" uuid PRIMARY KEY NOT NULL,
	"group_id" integer NOT NULL,
	"kind" text NOT NULL,
	"title" text NOT NULL,
	"state" text DEFAULT 'queued' NOT NULL,
	"payload" jsonb NOT NULL,
	"done" bigint DEFAULT 0 NOT NULL,
	"total" bigint,
	"message" text,
	"error" jsonb,
	"link" text,
	"cancel_requested_at" timestamp with time zone,
	"created_by" integer NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"started_at" timestamp with time zone,
	"finished_at" timestamp with time zone,
	"progress_at" timestamp with time zone
);
--> statement-breakpoint
CREATE TABLE "worker_heartbeat" (
	"worker_id" text PRIMARY KEY NOT NULL,
	"host" text NOT NULL,
	"pid" integer NOT NULL,
	"beat_at" timestamp with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
CREATE TABLE "alias" (
	"id" bigint PRIMARY KEY GENERATED ALWAYS AS IDENTITY (sequence name "alias_id_seq" INCREMENT BY 1 MINVALUE 1 MAXVALUE 9223372036854775807 START WITH 1 CACHE 1),
	"group_id" integer NOT NULL,
	"object_id" bigint NOT NULL,
	"name" text NOT NULL,
	"key" text NOT NULL,
	"origin" text NOT NULL,
	"person_id" integer,
	"at" timestamp with time zone DEFAULT now() NOT NULL,
	"retired_at" timestamp with time zone
);
--> statement-breakpoint
CREATE TABLE "note" (
	"id" bigint PRIMARY KEY GENERATED ALWAYS AS IDENTITY (sequence name "note_id_seq" INCREMENT BY 1 MINVALUE 1 MAXVALUE 9223372036854775807 START WITH 1 CACHE 1),
	"group_id" integer NOT NULL,
	"object_id" bigint NOT NULL,
	"body" text NOT NULL,
	"person_id" integer NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"edited_at" timestamp with time zone,
	"deleted_at" timestamp with time zone
);
--> statement-breakpoint
CREATE TABLE "note_version" (
	"id" bigint PRIMARY KEY GENERATED ALWAYS AS IDENTITY (sequence name "note_version_id_seq" INCREMENT BY 1 MINVALUE 1 MAXVALUE 9223372036854775807 START WITH 1 CACHE 1),
	"group_id" integer NOT NULL,
	"note_id" bigint NOT NULL,
	"body" text NOT NULL,
	"replaced_at" timestamp with time zone DEFAULT now() NOT NULL,
	"person_id" integer NOT NULL
);
--> statement-breakpoint
CREATE TABLE "object" (
	"id" bigint PRIMARY KEY NOT NULL,
	"group_id" integer NOT NULL,
	"number" bigint NOT NULL,
	"merged_into" bigint,
	"ra_deg" double precision NOT NULL,
	"dec_deg" double precision NOT NULL,
	"err_arcsec" double precision,
	"zone" smallint GENERATED ALWAYS AS (floor((dec_deg + 90) * 10)::smallint) STORED NOT NULL,
	"name" text NOT NULL,
	"name_chosen" boolean DEFAULT false NOT NULL,
	"entries" integer DEFAULT 1 NOT NULL,
	"version" integer DEFAULT 1 NOT NULL
);
--> statement-breakpoint
CREATE TABLE "login_session" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"person_id" integer NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"last_seen_at" timestamp with time zone DEFAULT now() NOT NULL,
	"expires_at" timestamp with time zone NOT NULL,
	"revoked_at" timestamp with time zone,
	"user_agent" text NOT NULL
);
--> statement-breakpoint
CREATE TABLE "person" (
	"id" integer PRIMARY KEY GENERATED ALWAYS AS IDENTITY (sequence name "person_id_seq" INCREMENT BY 1 MINVALUE 1 MAXVALUE 2147483647 START WITH 1 CACHE 1),
	"email" "citext" NOT NULL,
	"name" text NOT NULL,
	"password_hash" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "person_email_unique" UNIQUE("email")
);
--> statement-breakpoint
CREATE TABLE "applied_policy" (
	"id" integer PRIMARY KEY GENERATED ALWAYS AS IDENTITY (sequence name "applied_policy_id_seq" INCREMENT BY 1 MINVALUE 1 MAXVALUE 2147483647 START WITH 1 CACHE 1),
	"group_id" integer NOT NULL,
	"run_id" integer NOT NULL,
	"rule" jsonb NOT NULL,
	"verdicts" bigint DEFAULT 0 NOT NULL,
	"created_by" integer NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"taken_back_at" timestamp with time zone
);
--> statement-breakpoint
CREATE TABLE "candidate" (
	"group_id" integer NOT NULL,
	"run_id" integer NOT NULL,
	"seq" integer NOT NULL,
	"entry_a" bigint NOT NULL,
	"entry_b" bigint NOT NULL,
	"revision_a" integer NOT NULL,
	"revision_b" integer NOT NULL,
	"row_a" integer NOT NULL,
	"row_b" integer NOT NULL,
	"sep_arcsec" double precision NOT NULL,
	"pa_deg" double precision,
	"rank_a" integer NOT NULL,
	"rank_b" integer NOT NULL,
	"rivals_a" integer NOT NULL,
	"rivals_b" integer NOT NULL,
	"mutual_best" boolean NOT NULL,
	CONSTRAINT "candidate_run_id_seq_pk" PRIMARY KEY("run_id","seq")
) PARTITION BY LIST ("run_id");
--> statement-breakpoint
CREATE TABLE "match_run" (
	"id" integer PRIMARY KEY GENERATED ALWAYS AS IDENTITY (sequence name "match_run_id_seq" INCREMENT BY 1 MINVALUE 1 MAXVALUE 2147483647 START WITH 1 CACHE 1),
	"group_id" integer NOT NULL,
	"number" integer NOT NULL,
	"title" text NOT NULL,
	"revision_ids" integer[] NOT NULL,
	"radius_arcsec" double precision NOT NULL,
	"candidates" bigint DEFAULT 0 NOT NULL,
	"pairs" jsonb DEFAULT '[]'::jsonb NOT NULL,
	"software_version" text NOT NULL,
	"job_id" uuid NOT NULL,
	"created_by" integer NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "match_run_number_unique" UNIQUE("group_id","number")
);
--> statement-breakpoint
CREATE TABLE "verdict" (
	"id" bigint PRIMARY KEY GENERATED ALWAYS AS IDENTITY (sequence name "verdict_id_seq" INCREMENT BY 1 MINVALUE 1 MAXVALUE 9223372036854775807 START WITH 1 CACHE 1),
	"group_id" integer NOT NULL,
	"entry_a" bigint NOT NULL,
	"entry_b" bigint NOT NULL,
	"value" text,
	"grade" text,
	"flags" text[] DEFAULT '{}' NOT NULL,
	"remark" text DEFAULT '' NOT NULL,
	"person_id" integer NOT NULL,
	"run_id" integer,
	"policy_id" integer,
	"takes_back" bigint,
	"at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "verdict_pair_ordered" CHECK ("verdict"."entry_a" < "verdict"."entry_b"),
	CONSTRAINT "verdict_value_or_take_back" CHECK (("verdict"."value" is null) = ("verdict"."takes_back" is not null))
);
--> statement-breakpoint
CREATE TABLE "verdict_in_force" (
	"group_id" integer NOT NULL,
	"entry_a" bigint NOT NULL,
	"entry_b" bigint NOT NULL,
	"verdict_id" bigint NOT NULL,
	"value" text NOT NULL,
	"grade" text,
	"policy_id" integer,
	CONSTRAINT "verdict_in_force_entry_a_entry_b_pk" PRIMARY KEY("entry_a","entry_b")
);
--> statement-breakpoint
ALTER TABLE "catalogue_revision" ADD CONSTRAINT "catalogue_revision_catalogue_id_catalogue_id_fk" FOREIGN KEY ("catalogue_id") REFERENCES "public"."catalogue"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "catalogue_revision" ADD CONSTRAINT "catalogue_revision_file_id_stored_file_id_fk" FOREIGN KEY ("file_id") REFERENCES "public"."stored_file"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "membership" ADD CONSTRAINT "membership_group_id_research_group_id_fk" FOREIGN KEY ("group_id") REFERENCES "public"."research_group"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "membership" ADD CONSTRAINT "membership_person_id_person_id_fk" FOREIGN KEY ("person_id") REFERENCES "public"."person"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "note_version" ADD CONSTRAINT "note_version_note_id_note_id_fk" FOREIGN KEY ("note_id") REFERENCES "public"."note"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "login_session" ADD CONSTRAINT "login_session_person_id_person_id_fk" FOREIGN KEY ("person_id") REFERENCES "public"."person"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
CREATE INDEX "source_entry" ON "source" USING btree ("entry_id");--> statement-breakpoint
CREATE INDEX "audit_event_group" ON "audit_event" USING btree ("group_id","id");--> statement-breakpoint
CREATE INDEX "audit_event_subject" ON "audit_event" USING btree ("group_id","subject");--> statement-breakpoint
CREATE INDEX "membership_person" ON "membership" USING btree ("person_id");--> statement-breakpoint
CREATE INDEX "job_group_created" ON "job" USING btree ("group_id","created_at");--> statement-breakpoint
CREATE INDEX "alias_key" ON "alias" USING btree ("group_id","key");--> statement-breakpoint
CREATE INDEX "alias_object" ON "alias" USING btree ("object_id");--> statement-breakpoint
CREATE INDEX "alias_key_trgm" ON "alias" USING gin ("key" gin_trgm_ops);--> statement-breakpoint
CREATE INDEX "note_object" ON "note" USING btree ("object_id");--> statement-breakpoint
CREATE INDEX "note_version_note" ON "note_version" USING btree ("note_id");--> statement-breakpoint
CREATE UNIQUE INDEX "object_number_unique" ON "object" USING btree ("group_id","number");--> statement-breakpoint
CREATE INDEX "object_sky" ON "object" USING btree ("group_id","zone","ra_deg") WHERE merged_into is null;--> statement-breakpoint
CREATE INDEX "object_merged_into" ON "object" USING btree ("merged_into") WHERE merged_into is not null;--> statement-breakpoint
CREATE INDEX "login_session_person" ON "login_session" USING btree ("person_id");--> statement-breakpoint
CREATE INDEX "candidate_entry_a" ON "candidate" USING btree ("run_id","entry_a");--> statement-breakpoint
CREATE INDEX "candidate_entry_b" ON "candidate" USING btree ("run_id","entry_b");--> statement-breakpoint
CREATE INDEX "verdict_pair" ON "verdict" USING btree ("group_id","entry_a","entry_b");--> statement-breakpoint
CREATE INDEX "verdict_entry_b" ON "verdict" USING btree ("entry_b");--> statement-breakpoint
CREATE INDEX "verdict_policy" ON "verdict" USING btree ("policy_id");--> statement-breakpoint
CREATE INDEX "verdict_takes_back" ON "verdict" USING btree ("takes_back");--> statement-breakpoint
CREATE INDEX "verdict_in_force_entry_b" ON "verdict_in_force" USING btree ("entry_b");--> statement-breakpoint
CREATE INDEX "verdict_in_force_group" ON "verdict_in_force" USING btree ("group_id","value");