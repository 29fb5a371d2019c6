CREATE TABLE "rate_limit" (
	"key" text PRIMARY KEY NOT NULL,
	"points" integer DEFAULT 0 NOT NULL,
	"expire" timestamp (3) with time zone
);
--> statement-breakpoint
CREATE TABLE "exclusion" (
	"workshop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"machine_id" uuid NOT NULL,
	"register" text NOT NULL,
	"wheel" integer NOT NULL,
	"reason" text NOT NULL,
	"since" date NOT NULL,
	"created_at" timestamp (3) with time zone DEFAULT now() NOT NULL,
	"created_by" uuid NOT NULL,
	"ended_at" timestamp (3) with time zone,
	"ended_by" uuid,
	CONSTRAINT "exclusion_workshop_id_id_pk" PRIMARY KEY("workshop_id","id"),
	CONSTRAINT "exclusion_register" CHECK ("register" in ('result', 'counter')),
	CONSTRAINT "exclusion_wheel" CHECK (wheel between 1 and 32),
	CONSTRAINT "exclusion_reason" CHECK (char_length(reason) between 1 and 500),
	CONSTRAINT "exclusion_ended_by" CHECK ((ended_at is null) = (ended_by is null))
);
--> statement-breakpoint
ALTER TABLE "exclusion" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE TABLE "machine" (
	"workshop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"name" text NOT NULL,
	"serial" text DEFAULT '' NOT NULL,
	"scale" numeric(6, 3),
	"state" text DEFAULT 'being-built' NOT NULL,
	"turns_before" bigint DEFAULT 0 NOT NULL,
	"layout_revision" integer DEFAULT 1 NOT NULL,
	"note" text DEFAULT '' NOT NULL,
	"version" integer DEFAULT 1 NOT NULL,
	"created_at" timestamp (3) with time zone DEFAULT now() NOT NULL,
	"created_by" uuid NOT NULL,
	"updated_at" timestamp (3) with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "machine_workshop_id_id_pk" PRIMARY KEY("workshop_id","id"),
	CONSTRAINT "machine_state" CHECK ("state" in ('being-built', 'running-in', 'under-test', 'accepted', 'handed-over', 'out-of-service')),
	CONSTRAINT "machine_name_length" CHECK (char_length(name) between 1 and 80),
	CONSTRAINT "machine_scale" CHECK (scale is null or (scale > 0 and scale <= 100)),
	CONSTRAINT "machine_turns_before" CHECK (turns_before >= 0)
);
--> statement-breakpoint
ALTER TABLE "machine" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE TABLE "machine_layout" (
	"workshop_id" uuid NOT NULL,
	"machine_id" uuid NOT NULL,
	"revision" integer NOT NULL,
	"setting_slides" integer NOT NULL,
	"result_wheels" integer NOT NULL,
	"counter_wheels" integer NOT NULL,
	"carriage_positions" integer NOT NULL,
	"subtraction" text NOT NULL,
	"complement_columns" integer,
	"result_carry" integer,
	"counter_carry" boolean NOT NULL,
	"created_at" timestamp (3) with time zone DEFAULT now() NOT NULL,
	"created_by" uuid NOT NULL,
	CONSTRAINT "machine_layout_workshop_id_machine_id_revision_pk" PRIMARY KEY("workshop_id","machine_id","revision"),
	CONSTRAINT "machine_layout_subtraction" CHECK ("subtraction" in ('complement', 'reverse', 'none')),
	CONSTRAINT "machine_layout_revision" CHECK (revision >= 1),
	CONSTRAINT "machine_layout_counts" CHECK (setting_slides between 1 and 32 and result_wheels between 1 and 32 and counter_wheels between 0 and 32
        and carriage_positions between 1 and 32 and complement_columns between 1 and 32 and result_carry between 0 and 32)
);
--> statement-breakpoint
ALTER TABLE "machine_layout" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE TABLE "credential" (
	"person_id" uuid PRIMARY KEY NOT NULL,
	"password_hash" text NOT NULL,
	"changed_at" timestamp (3) with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
ALTER TABLE "credential" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE TABLE "invitation" (
	"workshop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"email" text NOT NULL,
	"name" text NOT NULL,
	"role" text NOT NULL,
	"token_hash" text NOT NULL,
	"created_by" uuid NOT NULL,
	"created_at" timestamp (3) with time zone DEFAULT now() NOT NULL,
	"expires_at" timestamp (3) with time zone NOT NULL,
	"accepted_at" timestamp (3) with time zone,
	"revoked_at" timestamp (3) with time zone,
	CONSTRAINT "invitation_workshop_id_id_pk" PRIMARY KEY("workshop_id","id"),
	CONSTRAINT "invitation_role" CHECK ("role" in ('lead', 'tester', 'builder', 'viewer')),
	CONSTRAINT "invitation_email_lower" CHECK (email = lower(email))
);
--> statement-breakpoint
ALTER TABLE "invitation" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE TABLE "membership" (
	"workshop_id" uuid NOT NULL,
	"person_id" uuid NOT NULL,
	"role" text NOT NULL,
	"created_at" timestamp (3) with time zone DEFAULT now() NOT NULL,
	"ended_at" timestamp (3) with time zone,
	CONSTRAINT "membership_workshop_id_person_id_pk" PRIMARY KEY("workshop_id","person_id"),
	CONSTRAINT "membership_role" CHECK ("role" in ('lead', 'tester', 'builder', 'viewer'))
);
--> statement-breakpoint
ALTER TABLE "membership" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE TABLE "person" (
	"id" uuid PRIMARY KEY NOT NULL,
	"email" text NOT NULL,
	"name" text NOT NULL,
	"created_at" timestamp (3) with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "person_email_lower" CHECK (email = lower(email) and char_length(email) between 3 and 254),
	CONSTRAINT "person_name_length" CHECK (char_length(name) between 1 and 80)
);
--> statement-breakpoint
ALTER TABLE "person" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE TABLE "session" (
	"id" uuid PRIMARY KEY NOT NULL,
	"person_id" uuid NOT NULL,
	"workshop_id" uuid,
	"created_at" timestamp (3) with time zone DEFAULT now() NOT NULL,
	"seen_at" timestamp (3) with time zone DEFAULT now() NOT NULL,
	"expires_at" timestamp (3) with time zone NOT NULL,
	"address" text,
	"agent" text
);
--> statement-breakpoint
ALTER TABLE "session" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE TABLE "workshop" (
	"id" uuid PRIMARY KEY NOT NULL,
	"name" text NOT NULL,
	"zone" text DEFAULT 'UTC' NOT NULL,
	"created_at" timestamp (3) with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "workshop_name_length" CHECK (char_length(name) between 1 and 80)
);
--> statement-breakpoint
ALTER TABLE "workshop" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE TABLE "reading" (
	"workshop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"run_id" uuid NOT NULL,
	"seq" integer NOT NULL,
	"result" text,
	"counter" text,
	"recorded_at" timestamp (3) with time zone DEFAULT now() NOT NULL,
	"recorded_by" uuid NOT NULL,
	"replaces" uuid,
	"reason" text,
	CONSTRAINT "reading_workshop_id_id_pk" PRIMARY KEY("workshop_id","id"),
	CONSTRAINT "reading_not_empty" CHECK (result is not null or counter is not null),
	CONSTRAINT "reading_glyphs" CHECK (result ~ '^([0-9]~?|[?]){1,32}$' and counter ~ '^([0-9]~?|[?]){1,32}$'),
	CONSTRAINT "reading_reason" CHECK ((replaces is null) = (reason is null) and char_length(reason) between 1 and 500)
);
--> statement-breakpoint
ALTER TABLE "reading" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE TABLE "run" (
	"workshop_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"number" integer NOT NULL,
	"machine_id" uuid NOT NULL,
	"layout_revision" integer NOT NULL,
	"title" text DEFAULT '' NOT NULL,
	"note" text DEFAULT '' NOT NULL,
	"source" text DEFAULT 'hand' NOT NULL,
	"tester_id" uuid NOT NULL,
	"zone" text DEFAULT 'UTC' NOT NULL,
	"start_result" text,
	"start_counter" text,
	"excluded" jsonb DEFAULT '[]'::jsonb NOT NULL,
	"started_at" timestamp (3) with time zone DEFAULT now() NOT NULL,
	"finished_at" timestamp (3) with time zone,
	"finished_by" uuid,
	"steps" integer DEFAULT 0 NOT NULL,
	"turns" bigint DEFAULT 0 NOT NULL,
	"readings" integer DEFAULT 0 NOT NULL,
	"disagreeing" integer DEFAULT 0 NOT NULL,
	"first_fault" jsonb,
	CONSTRAINT "run_workshop_id_id_pk" PRIMARY KEY("workshop_id","id"),
	CONSTRAINT "run_number" UNIQUE("workshop_id","number"),
	CONSTRAINT "run_source" CHECK ("source" in ('hand', 'file', 'api')),
	CONSTRAINT "run_tallies" CHECK (steps >= 0 and turns >= 0 and readings >= 0 and disagreeing between 0 and readings),
	CONSTRAINT "run_finished_by" CHECK ((finished_at is null) = (finished_by is null)),
	CONSTRAINT "run_text" CHECK (char_length(title) <= 80 and char_length(note) <= 2000)
);
--> statement-breakpoint
ALTER TABLE "run" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE TABLE "run_file" (
	"workshop_id" uuid NOT NULL,
	"run_id" uuid NOT NULL,
	"name" text NOT NULL,
	"sha256" text NOT NULL,
	"content" "bytea" NOT NULL,
	"created_at" timestamp (3) with time zone DEFAULT now() NOT NULL,
	"created_by" uuid NOT NULL,
	CONSTRAINT "run_file_workshop_id_run_id_pk" PRIMARY KEY("workshop_id","run_id"),
	CONSTRAINT "run_file_size" CHECK (octet_length(content) <= 1048576 and char_length(name) between 1 and 255)
);
--> statement-breakpoint
ALTER TABLE "run_file" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE TABLE "run_step" (
	"workshop_id" uuid NOT NULL,
	"run_id" uuid NOT NULL,
	"seq" integer NOT NULL,
	"id" uuid NOT NULL,
	"do" text NOT NULL,
	"slides" text,
	"carriage" integer,
	"way" text,
	"times" integer,
	"reversed" boolean,
	"clear" text,
	"note" text DEFAULT '' NOT NULL,
	"at" timestamp (3) with time zone,
	"at_offset" smallint,
	"recorded_at" timestamp (3) with time zone DEFAULT now() NOT NULL,
	"recorded_by" uuid NOT NULL,
	"withdrawn_at" timestamp (3) with time zone,
	"withdrawn_by" uuid,
	"withdrawn_reason" text,
	CONSTRAINT "run_step_workshop_id_run_id_seq_pk" PRIMARY KEY("workshop_id","run_id","seq"),
	CONSTRAINT "run_step_do" CHECK ("do" in ('set', 'turn', 'shift', 'reverse', 'clear')),
	CONSTRAINT "run_step_seq" CHECK (seq >= 1),
	CONSTRAINT "run_step_fields" CHECK ((("do" = 'set') = (slides is not null)) and (("do" = 'shift') = (carriage is not null))
        and (("do" = 'turn') = (way is not null)) and (("do" = 'turn') = (times is not null))
        and (("do" = 'reverse') = (reversed is not null)) and (("do" = 'clear') = (clear is not null))),
	CONSTRAINT "run_step_slides" CHECK (slides ~ '^[0-9]{1,32}$'),
	CONSTRAINT "run_step_ranges" CHECK (times between 1 and 1000000 and carriage between 1 and 32),
	CONSTRAINT "run_step_at" CHECK ((at is null) = (at_offset is null) and at_offset between -1439 and 1439),
	CONSTRAINT "run_step_note" CHECK (char_length(note) <= 500),
	CONSTRAINT "run_step_withdrawn" CHECK ((withdrawn_at is null) = (withdrawn_by is null) and (withdrawn_at is null) = (withdrawn_reason is null))
);
--> statement-breakpoint
ALTER TABLE "run_step" ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
ALTER TABLE "exclusion" ADD CONSTRAINT "exclusion_workshop_id_machine_id_machine_workshop_id_id_fk" FOREIGN KEY ("workshop_id","machine_id") REFERENCES "public"."machine"("workshop_id","id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "exclusion" ADD CONSTRAINT "exclusion_workshop_id_created_by_membership_workshop_id_person_id_fk" FOREIGN KEY ("workshop_id","created_by") REFERENCES "public"."membership"("workshop_id","person_id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "exclusion" ADD CONSTRAINT "exclusion_workshop_id_ended_by_membership_workshop_id_person_id_fk" FOREIGN KEY ("workshop_id","ended_by") REFERENCES "public"."membership"("workshop_id","person_id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "machine" ADD CONSTRAINT "machine_workshop_id_workshop_id_fk" FOREIGN KEY ("workshop_id") REFERENCES "public"."workshop"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "machine" ADD CONSTRAINT "machine_workshop_id_created_by_membership_workshop_id_person_id_fk" FOREIGN KEY ("workshop_id","created_by") REFERENCES "public"."membership"("workshop_id","person_id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "machine_layout" ADD CONSTRAINT "machine_layout_workshop_id_machine_id_machine_workshop_id_id_fk" FOREIGN KEY ("workshop_id","machine_id") REFERENCES "public"."machine"("workshop_id","id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "machine_layout" ADD CONSTRAINT "machine_layout_workshop_id_created_by_membership_workshop_id_person_id_fk" FOREIGN KEY ("workshop_id","created_by") REFERENCES "public"."membership"("workshop_id","person_id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "credential" ADD CONSTRAINT "credential_person_id_person_id_fk" FOREIGN KEY ("person_id") REFERENCES "public"."person"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "invitation" ADD CONSTRAINT "invitation_workshop_id_workshop_id_fk" FOREIGN KEY ("workshop_id") REFERENCES "public"."workshop"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "invitation" ADD CONSTRAINT "invitation_workshop_id_created_by_membership_workshop_id_person_id_fk" FOREIGN KEY ("workshop_id","created_by") REFERENCES "public"."membership"("workshop_id","person_id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "membership" ADD CONSTRAINT "membership_workshop_id_workshop_id_fk" FOREIGN KEY ("workshop_id") REFERENCES "public"."workshop"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "membership" ADD CONSTRAINT "membership_person_id_person_id_fk" FOREIGN KEY ("person_id") REFERENCES "public"."person"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "session" ADD CONSTRAINT "session_person_id_person_id_fk" FOREIGN KEY ("person_id") REFERENCES "public"."person"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "session" ADD CONSTRAINT "session_workshop_id_workshop_id_fk" FOREIGN KEY ("workshop_id") REFERENCES "public"."workshop"("id") ON DELETE set null ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "reading" ADD CONSTRAINT "reading_workshop_id_run_id_seq_run_step_workshop_id_run_id_seq_fk" FOREIGN KEY ("workshop_id","run_id","seq") REFERENCES "public"."run_step"("workshop_id","run_id","seq") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "reading" ADD CONSTRAINT "reading_workshop_id_replaces_reading_workshop_id_id_fk" FOREIGN KEY ("workshop_id","replaces") REFERENCES "public"."reading"("workshop_id","id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "reading" ADD CONSTRAINT "reading_workshop_id_recorded_by_membership_workshop_id_person_id_fk" FOREIGN KEY ("workshop_id","recorded_by") REFERENCES "public"."membership"("workshop_id","person_id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "run" ADD CONSTRAINT "run_workshop_id_machine_id_machine_workshop_id_id_fk" FOREIGN KEY ("workshop_id","machine_id") REFERENCES "public"."machine"("workshop_id","id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "run" ADD CONSTRAINT "run_workshop_id_machine_id_layout_revision_machine_layout_workshop_id_machine_id_revision_fk" FOREIGN KEY ("workshop_id","machine_id","layout_revision") REFERENCES "public"."machine_layout"("workshop_id","machine_id","revision") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "run" ADD CONSTRAINT "run_workshop_id_tester_id_membership_workshop_id_person_id_fk" FOREIGN KEY ("workshop_id","tester_id") REFERENCES "public"."membership"("workshop_id","person_id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "run" ADD CONSTRAINT "run_workshop_id_finished_by_membership_workshop_id_person_id_fk" FOREIGN KEY ("workshop_id","finished_by") REFERENCES "public"."membership"("workshop_id","person_id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "run_file" ADD CONSTRAINT "run_file_workshop_id_run_id_run_workshop_id_id_fk" FOREIGN KEY ("workshop_id","run_id") REFERENCES "public"."run"("workshop_id","id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "run_file" ADD CONSTRAINT "run_file_workshop_id_created_by_membership_workshop_id_person_id_fk" FOREIGN KEY ("workshop_id","created_by") REFERENCES "public"."membership"("workshop_id","person_id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "run_step" ADD CONSTRAINT "run_step_workshop_id_run_id_run_workshop_id_id_fk" FOREIGN KEY ("workshop_id","run_id") REFERENCES "public"."run"("workshop_id","id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "run_step" ADD CONSTRAINT "run_step_workshop_id_recorded_by_membership_workshop_id_person_id_fk" FOREIGN KEY ("workshop_id","recorded_by") REFERENCES "public"."membership"("workshop_id","person_id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "run_step" ADD CONSTRAINT "run_step_workshop_id_withdrawn_by_membership_workshop_id_person_id_fk" FOREIGN KEY ("workshop_id","withdrawn_by") REFERENCES "public"."membership"("workshop_id","person_id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
CREATE INDEX "exclusion_by_machine" ON "exclusion" USING btree ("workshop_id","machine_id");--> statement-breakpoint
CREATE UNIQUE INDEX "exclusion_open" ON "exclusion" USING btree ("workshop_id","machine_id","register","wheel") WHERE ended_at is null;--> statement-breakpoint
CREATE UNIQUE INDEX "machine_name" ON "machine" USING btree ("workshop_id",lower("name"));--> statement-breakpoint
CREATE UNIQUE INDEX "invitation_token" ON "invitation" USING btree ("token_hash");--> statement-breakpoint
CREATE UNIQUE INDEX "invitation_open" ON "invitation" USING btree ("workshop_id","email") WHERE accepted_at is null and revoked_at is null;--> statement-breakpoint
CREATE INDEX "membership_by_person" ON "membership" USING btree ("person_id");--> statement-breakpoint
CREATE UNIQUE INDEX "person_email" ON "person" USING btree ("email");--> statement-breakpoint
CREATE INDEX "session_by_person" ON "session" USING btree ("person_id");--> statement-breakpoint
CREATE INDEX "reading_by_step" ON "reading" USING btree ("workshop_id","run_id","seq");--> statement-breakpoint
CREATE UNIQUE INDEX "reading_first" ON "reading" USING btree ("workshop_id","run_id","seq") WHERE replaces is null;--> statement-breakpoint
CREATE UNIQUE INDEX "reading_correction" ON "reading" USING btree ("workshop_id","replaces");--> statement-breakpoint
CREATE INDEX "run_by_machine" ON "run" USING btree ("workshop_id","machine_id","started_at");--> statement-breakpoint
CREATE INDEX "run_file_sha256" ON "run_file" USING btree ("workshop_id","sha256");--> statement-breakpoint
CREATE UNIQUE INDEX "run_step_id" ON "run_step" USING btree ("workshop_id","id");--> statement-breakpoint
CREATE POLICY "exclusion_of_workshop" ON "exclusion" AS PERMISSIVE FOR ALL TO public USING (workshop_id = nineover_workshop()) WITH CHECK (workshop_id = nineover_workshop());--> statement-breakpoint
CREATE POLICY "machine_of_workshop" ON "machine" AS PERMISSIVE FOR ALL TO public USING (workshop_id = nineover_workshop()) WITH CHECK (workshop_id = nineover_workshop());--> statement-breakpoint
CREATE POLICY "machine_layout_of_workshop" ON "machine_layout" AS PERMISSIVE FOR ALL TO public USING (workshop_id = nineover_workshop()) WITH CHECK (workshop_id = nineover_workshop());--> statement-breakpoint
CREATE POLICY "credential_of_person" ON "credential" AS PERMISSIVE FOR ALL TO public USING (person_id = nineover_person()) WITH CHECK (person_id = nineover_person());--> statement-breakpoint
CREATE POLICY "invitation_of_workshop" ON "invitation" AS PERMISSIVE FOR ALL TO public USING (workshop_id = nineover_workshop()) WITH CHECK (workshop_id = nineover_workshop());--> statement-breakpoint
CREATE POLICY "invitation_of_holder" ON "invitation" AS PERMISSIVE FOR SELECT TO public USING (token_hash = nineover_invitation());--> statement-breakpoint
CREATE POLICY "membership_of_workshop" ON "membership" AS PERMISSIVE FOR ALL TO public USING (workshop_id = nineover_workshop()) WITH CHECK (workshop_id = nineover_workshop());--> statement-breakpoint
CREATE POLICY "membership_of_person" ON "membership" AS PERMISSIVE FOR SELECT TO public USING (person_id = nineover_person());--> statement-breakpoint
CREATE POLICY "person_themself" ON "person" AS PERMISSIVE FOR ALL TO public USING (id = nineover_person()) WITH CHECK (id = nineover_person());--> statement-breakpoint
CREATE POLICY "person_by_email" ON "person" AS PERMISSIVE FOR SELECT TO public USING (email = nineover_email());--> statement-breakpoint
CREATE POLICY "person_of_workshop" ON "person" AS PERMISSIVE FOR SELECT TO public USING (exists (select 1 from membership m where m.person_id = id and m.workshop_id = nineover_workshop()));--> statement-breakpoint
CREATE POLICY "session_by_id" ON "session" AS PERMISSIVE FOR ALL TO public USING (id = nineover_session()) WITH CHECK (id = nineover_session());--> statement-breakpoint
CREATE POLICY "session_of_person" ON "session" AS PERMISSIVE FOR ALL TO public USING (person_id = nineover_person()) WITH CHECK (person_id = nineover_person());--> statement-breakpoint
CREATE POLICY "workshop_itself" ON "workshop" AS PERMISSIVE FOR ALL TO public USING (id = nineover_workshop()) WITH CHECK (id = nineover_workshop());--> statement-breakpoint
CREATE POLICY "workshop_of_member" ON "workshop" AS PERMISSIVE FOR SELECT TO public USING (exists (select 1 from membership m where m.workshop_id = id and m.person_id = nineover_person() and m.ended_at is null));--> statement-breakpoint
CREATE POLICY "reading_of_workshop" ON "reading" AS PERMISSIVE FOR ALL TO public USING (workshop_id = nineover_workshop()) WITH CHECK (workshop_id = nineover_workshop());--> statement-breakpoint
CREATE POLICY "run_of_workshop" ON "run" AS PERMISSIVE FOR ALL TO public USING (workshop_id = nineover_workshop()) WITH CHECK (workshop_id = nineover_workshop());--> statement-breakpoint
CREATE POLICY "run_file_of_workshop" ON "run_file" AS PERMISSIVE FOR ALL TO public USING (workshop_id = nineover_workshop()) WITH CHECK (workshop_id = nineover_workshop());--> statement-breakpoint
CREATE POLICY "run_step_of_workshop" ON "run_step" AS PERMISSIVE FOR ALL TO public USING (workshop_id = nineover_workshop()) WITH CHECK (workshop_id = nineover_workshop());