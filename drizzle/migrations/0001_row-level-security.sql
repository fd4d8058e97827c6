-- The app always works as lapel_app, which owns nothing and is subject to every policy below.
do $$
begin
  if not exists (select from pg_roles where rolname = 'lapel_app') then
    create role lapel_app nologin;
  end if;
  if not pg_has_role(current_user, 'lapel_app', 'member') then
    begin
      execute format('grant lapel_app to %I', current_user);
    exception when insufficient_privilege then
      -- The app signs in as lapel_app itself; whoever migrates need not be able to become it.
      null;
    end;
  end if;
end $$;--> statement-breakpoint
grant usage on schema public to lapel_app;--> statement-breakpoint
grant select, insert, update, delete on all tables in schema public to lapel_app;--> statement-breakpoint
-- The ledger is append-only; erasing a person blanks this one column of it and nothing else.
revoke update, delete on op from lapel_app;--> statement-breakpoint
grant update (personal) on op to lapel_app;--> statement-breakpoint
revoke delete on organisations, users, sessions, row_state, device, grant_scope from lapel_app;--> statement-breakpoint
create function current_organisation() returns uuid language sql stable parallel safe
  as $$ select nullif(current_setting('app.organisation', true), '')::uuid $$;--> statement-breakpoint
create function is_outside() returns boolean language sql stable parallel safe
  as $$ select coalesce(current_setting('app.outside', true), '') = 'on' $$;--> statement-breakpoint
alter table op enable row level security;--> statement-breakpoint
alter table row_state enable row level security;--> statement-breakpoint
alter table grant_scope enable row level security;--> statement-breakpoint
alter table device enable row level security;--> statement-breakpoint
alter table sheets enable row level security;--> statement-breakpoint
alter table surveys enable row level security;--> statement-breakpoint
alter table org_clock enable row level security;--> statement-breakpoint
alter table organisations enable row level security;--> statement-breakpoint
alter table users enable row level security;--> statement-breakpoint
alter table sessions enable row level security;--> statement-breakpoint
alter table sign_in_attempts enable row level security;--> statement-breakpoint
create policy own on op to lapel_app using (organisation = current_organisation());--> statement-breakpoint
create policy own on row_state to lapel_app using (organisation = current_organisation());--> statement-breakpoint
create policy own on grant_scope to lapel_app using (organisation = current_organisation());--> statement-breakpoint
create policy own on device to lapel_app using (organisation = current_organisation());--> statement-breakpoint
create policy own on sheets to lapel_app using (organisation = current_organisation());--> statement-breakpoint
create policy own on surveys to lapel_app using (organisation = current_organisation());--> statement-breakpoint
create policy own on org_clock to lapel_app using (organisation = current_organisation());--> statement-breakpoint
create policy own on organisations to lapel_app using (id = current_organisation() or is_outside());--> statement-breakpoint
create policy own on users to lapel_app using (organisation = current_organisation() or is_outside());--> statement-breakpoint
create policy own on sessions to lapel_app using (organisation = current_organisation() or is_outside());--> statement-breakpoint
create policy own on sign_in_attempts to lapel_app using (is_outside());--> statement-breakpoint
-- One hot row an organisation: room for updates in place.
alter table org_clock set (fillfactor = 10, autovacuum_vacuum_threshold = 50, autovacuum_vacuum_scale_factor = 0);
