-- The four roles of Boltwalk, made by a superuser once for each cluster; running it again only sets the passwords.
--   psql -v owner_password=… -v app_password=… -v backup_password=… -f db/roles.sql
--
-- boltwalk_owner   owns the tables and migrates them; forced row-level security holds for it as well
-- boltwalk_app     what the server signs in as: no bypass, owns nothing
-- boltwalk_lookup  nobody signs in as it; it owns the few SECURITY DEFINER functions that look across shops
-- boltwalk_backup  reads every shop for a backup

\set ON_ERROR_STOP on
set password_encryption = 'scram-sha-256';

select format('create role %I', name)
from unnest(array['boltwalk_owner', 'boltwalk_app', 'boltwalk_lookup', 'boltwalk_backup']) as name
where not exists (select from pg_roles where rolname = name)
\gexec

alter role boltwalk_owner login nosuperuser nobypassrls nocreaterole nocreatedb password :'owner_password';
alter role boltwalk_app login nosuperuser nobypassrls nocreaterole nocreatedb password :'app_password';
alter role boltwalk_lookup nologin nosuperuser bypassrls nocreaterole nocreatedb;
alter role boltwalk_backup login nosuperuser bypassrls nocreaterole nocreatedb password :'backup_password';

-- So that a migration may hand a function over to boltwalk_lookup. The attribute BYPASSRLS itself is never inherited.
grant boltwalk_lookup to boltwalk_owner;
grant pg_read_all_data to boltwalk_backup;
