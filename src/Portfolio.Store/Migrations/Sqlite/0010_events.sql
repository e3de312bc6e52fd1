-- Events for those who listen: each has an id of its own; who wants which, and what became of every delivery.

create table outbox_with_ids (
  sequence  integer not null primary key check (sequence >= 1),
  id        text    not null unique check (id <> ''),
  at        integer not null,
  portfolio text    not null references portfolio (id),
  kind      text    not null,
  subject   text    not null,
  -- the one project it is about: what grants limited to projects reach
  project   text    check (project <> ''),
  payload   text    not null
) strict;

insert into outbox_with_ids (sequence, id, at, portfolio, kind, subject, payload)
  select sequence, lower(hex(randomblob(16))), at, portfolio, kind, subject, payload from outbox;

drop table outbox;

alter table outbox_with_ids rename to outbox;

create index outbox_by_portfolio on outbox (portfolio, sequence);

-- How far events have been handed to subscriptions: one row.
create table event_cursor (
  one     integer not null primary key check (one = 1),
  through integer not null check (through >= 0)
) strict;

insert into event_cursor (one, through) select 1, coalesce(max(sequence), 0) from outbox;

-- What is told once and never again: its name is taken in the transaction that tells it.
create table event_marker (
  portfolio text    not null references portfolio (id),
  name      text    not null check (name <> ''),
  at        integer not null,
  primary key (portfolio, name)
) strict;

create table subscription (
  portfolio       text    not null references portfolio (id),
  id              text    not null check (id <> ''),
  url             text    not null check (url <> ''),
  -- JSON array of what is wanted
  events          text    not null,
  active          integer not null check (active in (0, 1)),
  -- why the server has ended it: its target answered 410
  ended           text    check (ended in ('gone')),
  -- read back to sign with: whoever reads this file can sign
  secret          text    not null check (secret <> ''),
  previous_secret text,
  previous_until  integer,
  -- events up to this one came before it was made, or made active again
  after_event     integer not null check (after_event >= 0),
  -- attempts that failed since the last that did not
  failures        integer not null default 0 check (failures >= 0),
  created_at      integer not null,
  changed_at      integer not null,
  created_by      text    not null references api_key (id),
  primary key (portfolio, id),
  check ((previous_secret is null) = (previous_until is null)),
  check (ended is null or active = 0)
) strict;

create table delivery (
  id              text    not null primary key check (id <> ''),
  portfolio       text    not null,
  subscription    text    not null,
  event           integer not null references outbox (sequence),
  state           text    not null check (state in ('waiting', 'sending', 'delivered', 'dead')),
  attempt         integer not null default 0 check (attempt >= 0),
  -- rises with every claim; a sender's writes carry the number it was given
  fence           integer not null default 0 check (fence >= 0),
  owner           text,
  lease_until     integer,
  next_attempt_at integer,
  give_up_at      integer not null,
  last_attempt_at integer,
  last_status     integer check (last_status between 100 and 599),
  last_error      text,
  delivered_at    integer,
  unique (portfolio, subscription, event),
  foreign key (portfolio, subscription) references subscription (portfolio, id) on delete cascade,
  check ((state = 'sending') = (lease_until is not null)),
  check ((state = 'sending') = (owner is not null)),
  check ((state = 'waiting') = (next_attempt_at is not null)),
  check ((state = 'delivered') = (delivered_at is not null)),
  check (state <> 'dead' or last_error is not null)
) strict;

create index delivery_due on delivery (state, next_attempt_at);
create index delivery_by_event on delivery (event);
