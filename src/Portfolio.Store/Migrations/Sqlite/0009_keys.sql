-- A rotated key has two secrets for a while; people come with tokens of an issuer and have a key row of their own, which nobody can present.

alter table api_key add column old_hash text check (length(old_hash) = 64);
alter table api_key add column old_until integer;
-- 1: a text of it does not name its id, so it is looked for among all of these
alter table api_key add column plain integer not null default 1 check (plain in (0, 1));
-- to the hour
alter table api_key add column last_used_at integer;

create table person (
  issuer      text    not null check (issuer <> ''),
  subject     text    not null check (subject <> ''),
  key         text    not null unique references api_key (id),
  -- SHA-256 of the rights that the newest token claims
  claimed     text    not null check (length(claimed) = 64),
  issued_at   integer not null,
  primary key (issuer, subject)
) strict;
