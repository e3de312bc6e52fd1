-- A rotated key has two secrets for a while; people come with tokens of an issuer and have a key row of their own, which nobody can present.

alter table api_key add column old_hash text collate "C" check (length(old_hash) = 64);
alter table api_key add column old_until bigint;
-- 1: a text of it does not name its id, so it is looked for among all of these
alter table api_key add column plain bigint not null default 1 check (plain in (0, 1));
-- to the hour
alter table api_key add column last_used_at bigint;

create table person (
  issuer      text collate "C" not null check (issuer <> ''),
  subject     text collate "C" not null check (subject <> ''),
  key         text collate "C" not null unique references api_key (id),
  -- SHA-256 of the rights that the newest token claims
  claimed     text collate "C" not null check (length(claimed) = 64),
  issued_at   bigint           not null,
  primary key (issuer, subject)
);
