-- The role the application works as. It owns nothing, so row-level security binds it; a cluster made by
-- `npm start` has it already, with a login of its own.
DO $$ BEGIN
  IF NOT EXISTS (SELECT FROM pg_roles WHERE rolname = 'nineover_app') THEN
    BEGIN
      CREATE ROLE nineover_app NOLOGIN;
      -- Two databases of one cluster may be migrated at the same moment.
      EXCEPTION WHEN duplicate_object OR unique_violation THEN NULL;
    END;
    EXECUTE format('GRANT nineover_app TO %I', current_user);
  END IF;
END $$;
--> statement-breakpoint
-- What a transaction may see, set by the application's one helper and gone with the transaction.
CREATE FUNCTION nineover_workshop() RETURNS uuid LANGUAGE sql STABLE PARALLEL SAFE
  AS $$ SELECT nullif(current_setting('nineover.workshop', true), '')::uuid $$;
--> statement-breakpoint
CREATE FUNCTION nineover_person() RETURNS uuid LANGUAGE sql STABLE PARALLEL SAFE
  AS $$ SELECT nullif(current_setting('nineover.person', true), '')::uuid $$;
--> statement-breakpoint
CREATE FUNCTION nineover_session() RETURNS uuid LANGUAGE sql STABLE PARALLEL SAFE
  AS $$ SELECT nullif(current_setting('nineover.session', true), '')::uuid $$;
--> statement-breakpoint
CREATE FUNCTION nineover_email() RETURNS text LANGUAGE sql STABLE PARALLEL SAFE
  AS $$ SELECT nullif(current_setting('nineover.email', true), '') $$;
--> statement-breakpoint
CREATE FUNCTION nineover_invitation() RETURNS text LANGUAGE sql STABLE PARALLEL SAFE
  AS $$ SELECT nullif(current_setting('nineover.invitation', true), '') $$;
--> statement-breakpoint
GRANT USAGE ON SCHEMA public TO nineover_app;
