/**
 * The database schema as numbered steps. A step is never edited once it has landed: add the next one.
 * Times are UTC milliseconds. Samples stand in columnar blocks, a UTC day of one load to a block (see blocks.ts).
 */
export const migrations: readonly string[] = [
  `
  create table setting (name text primary key, value text not null);

  create table ram (
    id integer primary key,
    key text not null unique,
    name text not null unique collate nocase,
    installation text not null,
    created_at integer not null
  );

  create table visit (
    id integer primary key,
    ram_id integer not null references ram (id),
    at_ms integer not null,
    body text not null,
    unique (ram_id, at_ms)
  );

  create table accepted_reading (
    id integer primary key,
    ram_id integer not null references ram (id),
    accepted_at integer not null,
    reading text not null,
    unique (ram_id, reading)
  );

  create table original (sha256 text primary key, bytes integer not null);
  create table original_chunk (
    sha256 text not null references original (sha256),
    place integer not null,
    data blob not null,
    primary key (sha256, place)
  );

  create table load (
    id integer primary key,
    ram_id integer not null references ram (id),
    sha256 text not null references original (sha256),
    file text not null,
    loaded_at integer not null,
    kind text not null,
    receipt text not null,
    unique (ram_id, sha256)
  );

  create table channel (
    id integer primary key,
    ram_id integer not null references ram (id),
    channel text not null,
    unit text not null,
    unique (ram_id, channel, unit)
  );

  create table time_block (
    id integer primary key,
    ram_id integer not null references ram (id),
    load_id integer not null references load (id),
    day integer not null,
    first_ms integer not null,
    last_ms integer not null,
    count integer not null,
    contradicts integer not null,
    times blob not null
  );
  create index time_block_by_day on time_block (ram_id, day);

  create table channel_block (
    time_block_id integer not null references time_block (id),
    channel_id integer not null references channel (id),
    valid integer not null,
    least real,
    greatest real,
    total real,
    data blob not null
  );
  create unique index channel_block_place on channel_block (time_block_id, channel_id);

  create table burst (
    id integer primary key,
    ram_id integer not null references ram (id),
    load_id integer not null references load (id),
    at_ms integer not null,
    samples_per_s real not null,
    count integer not null,
    beats text not null,
    unique (ram_id, at_ms)
  );
  create table burst_trace (
    burst_id integer not null references burst (id),
    channel text not null,
    unit text not null,
    data blob not null,
    primary key (burst_id, channel)
  );

  create table day_observation (
    ram_id integer not null references ram (id),
    date text not null,
    from_ms integer not null,
    body text not null,
    primary key (ram_id, date)
  );

  create table day_figures (
    ram_id integer not null references ram (id),
    date text not null,
    from_ms integer not null,
    charted blob not null,
    body text not null,
    primary key (ram_id, date)
  );

  create table examination (
    ram_id integer primary key references ram (id),
    method integer not null,
    body text not null
  );
  `,
];
