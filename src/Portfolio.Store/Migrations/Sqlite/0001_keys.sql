-- Keys and what they may do. Instants are microseconds since 1970 in UTC, everywhere.

create table api_key (
  id          text    not null primary key,
  name        text    not null,
  -- SHA-256 of the presented text; null only for the server's own jobs, whose key nobody can present
  secret_hash text    unique,
  created_at  integer not null,
  expires_at  integer,
  revoked_at  integer,
  check (id <> ''),
  check (secret_hash is null or length(secret_hash) = 64),
  check ((id = 'system') = (secret_hash is null))
) strict;

create table key_grant (
  key       text not null references api_key (id),
  granted   text not null check (granted in ('read', 'submit', 'manage', 'finance', 'admin')),
  portfolio text not null check (portfolio <> ''),
  project   text check (project <> '')
) strict;

create unique index key_grant_once on key_grant (key, granted, portfolio, coalesce(project, ''));

insert into api_key (id, name, created_at) values ('system', 'system', 0);
insert into key_grant (key, granted, portfolio) values ('system', 'admin', '*');
