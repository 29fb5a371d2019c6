-- Row-level security for the owner too: a mistake in a connection string must not open the wall.
ALTER TABLE workshop FORCE ROW LEVEL SECURITY;
--> statement-breakpoint
ALTER TABLE person FORCE ROW LEVEL SECURITY;
--> statement-breakpoint
ALTER TABLE credential FORCE ROW LEVEL SECURITY;
--> statement-breakpoint
ALTER TABLE membership FORCE ROW LEVEL SECURITY;
--> statement-breakpoint
ALTER TABLE invitation FORCE ROW LEVEL SECURITY;
--> statement-breakpoint
ALTER TABLE session FORCE ROW LEVEL SECURITY;
--> statement-breakpoint
ALTER TABLE machine FORCE ROW LEVEL SECURITY;
--> statement-breakpoint
ALTER TABLE machine_layout FORCE ROW LEVEL SECURITY;
--> statement-breakpoint
ALTER TABLE exclusion FORCE ROW LEVEL SECURITY;
--> statement-breakpoint
ALTER TABLE run FORCE ROW LEVEL SECURITY;
--> statement-breakpoint
ALTER TABLE run_step FORCE ROW LEVEL SECURITY;
--> statement-breakpoint
ALTER TABLE reading FORCE ROW LEVEL SECURITY;
--> statement-breakpoint
ALTER TABLE run_file FORCE ROW LEVEL SECURITY;
--> statement-breakpoint
GRANT SELECT, INSERT, UPDATE ON workshop, person, credential, membership, invitation, machine TO nineover_app;
--> statement-breakpoint
GRANT SELECT, INSERT, UPDATE, DELETE ON session, rate_limit TO nineover_app;
--> statement-breakpoint
-- A layout may be changed only while no run refers to it; the foreign key of run and the store see to that.
GRANT SELECT, INSERT, UPDATE ON machine_layout TO nineover_app;
--> statement-breakpoint
GRANT SELECT, INSERT ON exclusion TO nineover_app;
--> statement-breakpoint
GRANT UPDATE (ended_at, ended_by) ON exclusion TO nineover_app;
--> statement-breakpoint
-- An empty run may be deleted; a step or a reading never: restricting foreign keys keep the run that has one.
GRANT SELECT, INSERT, UPDATE, DELETE ON run TO nineover_app;
--> statement-breakpoint
GRANT SELECT, INSERT ON run_step, reading, run_file TO nineover_app;
--> statement-breakpoint
GRANT UPDATE (withdrawn_at, withdrawn_by, withdrawn_reason) ON run_step TO nineover_app;
