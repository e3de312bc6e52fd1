-- The document in parts. A revision lists only what it changed; a row holds from its revision until the one that superseded it.

create table portfolio (
  id          text    not null primary key check (id <> ''),
  created_at  integer not null,
  archived_at integer
) strict;

create table part_content (
  hash  text    not null primary key check (length(hash) = 64),
  -- Brotli (RFC 7932)
  bytes blob    not null,
  -- of the expanded content
  size  integer not null check (size >= 0)
) strict;

create table revision (
  portfolio   text    not null references portfolio (id),
  number      integer not null check (number >= 1),
  recorded_at integer not null,
  actor       text    not null references api_key (id),
  note        text,
  primary key (portfolio, number)
) strict;

create table revision_part (
  portfolio  text    not null,
  revision   integer not null,
  -- '' is the settings
  project    text    not null,
  position   integer not null check (position >= 0),
  -- null: the part was removed
  hash       text    references part_content (hash),
  -- the next revision that touched the part; the greatest 64-bit number while there is none
  superseded integer not null default 9223372036854775807,
  primary key (portfolio, project, revision),
  foreign key (portfolio, revision) references revision (portfolio, number),
  check (superseded > revision),
  check ((project = '') = (position = 0))
) strict;

create index revision_part_valid on revision_part (portfolio, superseded, revision);
