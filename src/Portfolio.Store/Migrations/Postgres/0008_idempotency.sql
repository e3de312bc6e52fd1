-- What was answered to accepted writes that came with a key of their own: written in the same transaction as their effect.

create table kept_answer (
  caller   text collate "C" not null check (caller <> ''),
  -- SHA-256 of method and address with its query
  address  text collate "C" not null check (length(address) = 64),
  key      text collate "C" not null check (length(key) between 1 and 255),
  -- SHA-256 of what was sent: its conditions, media type and body
  request  text collate "C" not null check (length(request) = 64),
  status   bigint           not null check (status between 200 and 299),
  -- one line each, as in HTTP
  headers  text collate "C" not null,
  body     bytea            not null,
  kept_at  bigint           not null,
  primary key (caller, address, key)
);

create index kept_answer_by_age on kept_answer (kept_at);
