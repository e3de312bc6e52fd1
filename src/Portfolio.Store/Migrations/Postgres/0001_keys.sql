-- Keys and what they may do. Instants are microseconds since 1970 in UTC, everywhere.

create table api_key (
  id          text collate "C" not null primary key,
  name        text collate "C" not null,
  -- SHA-256 of the presented text; null only for the server's own jobs, whose key nobody can present
  secret_hash text collate "C" unique,
  created_at  bigint           not null,
  expires_at  bigint,
  revoked_at  bigint,
  check (id <> ''),
  check (secret_hash is null or length(secret_hash) = 64),
  check ((id = 'system') = (secret_hash is null))
);

create table key_grant (
  key       text collate "C" not null references api_key (id),
  granted   text collate "C" not null check (granted in ('read', 'submit', 'manage', 'finance', 'admin')),
  portfolio text collate "C" not null check (portfolio <> ''),
  project   text collate "C" check (project <> '')
);

create unique index key_grant_once on key_grant (key, granted, portfolio, coalesce(project, ''));

insert into api_key (id, name, created_at) values ('system', 'system', 0);
insert into key_grant (key, granted, portfolio) values ('system', 'admin', '*');
