namespace Acquire.Runs.Writing;

/// <summary>The tables of a run file; docs/run-file.md explains every column. Loads on SQLite 3.37 and newer.</summary>
internal static class RunSchema
{
    /// <summary>'ACQR', big-endian at offset 68 of the file.</summary>
    public const int ApplicationId = 0x41435152;

    /// <summary>Version of the tables; readers accept every older one.</summary>
    public const int Version = 1;

    public const string Tables = """
        CREATE TABLE run(key TEXT PRIMARY KEY, value TEXT NOT NULL) STRICT, WITHOUT ROWID;
        CREATE TABLE text(id INTEGER PRIMARY KEY, role TEXT NOT NULL, name TEXT NOT NULL, sha256 TEXT NOT NULL, text TEXT NOT NULL) STRICT;
        CREATE TABLE instrument(id INTEGER PRIMARY KEY, name TEXT NOT NULL, driver TEXT NOT NULL, address TEXT NOT NULL, identity TEXT NOT NULL) STRICT;
        CREATE TABLE channel(id INTEGER PRIMARY KEY, name TEXT NOT NULL UNIQUE, unit TEXT NOT NULL, instrument TEXT NOT NULL) STRICT;
        CREATE TABLE reading(id INTEGER PRIMARY KEY, t_us INTEGER NOT NULL, channel INTEGER NOT NULL, value REAL, quality INTEGER NOT NULL DEFAULT 0, raw TEXT) STRICT;
        CREATE TABLE event(id INTEGER PRIMARY KEY, t_us INTEGER NOT NULL, kind TEXT NOT NULL, severity INTEGER NOT NULL, source TEXT NOT NULL, text TEXT NOT NULL, data TEXT) STRICT;
        CREATE TABLE point(
          id INTEGER PRIMARY KEY, step INTEGER NOT NULL, leg INTEGER NOT NULL, direction INTEGER NOT NULL, light INTEGER NOT NULL,
          start_us INTEGER NOT NULL, end_us INTEGER NOT NULL, set_point_K REAL, stage_K REAL, sample_K REAL, sample_u_K REAL,
          bias_V REAL, current_plus_A REAL, current_minus_A REAL, conductance_S REAL, conductance_u_S REAL, half_sum_A REAL, range_A REAL,
          readings INTEGER NOT NULL, soak_s REAL, signal_settle_s REAL, wavelength_m REAL, irradiance_W_per_m2 REAL, monitor_A REAL,
          since_light_s REAL, quality INTEGER NOT NULL, reason TEXT, gates TEXT NOT NULL) STRICT;
        CREATE TABLE clock(id INTEGER PRIMARY KEY, t_us INTEGER NOT NULL, utc_us INTEGER NOT NULL) STRICT;
        CREATE TABLE block(id INTEGER PRIMARY KEY, first_reading INTEGER, last_reading INTEGER, closed_by TEXT NOT NULL, row_id INTEGER, head TEXT NOT NULL) STRICT;
        CREATE TABLE summary(id INTEGER PRIMARY KEY, channel INTEGER NOT NULL, level INTEGER NOT NULL, first_id INTEGER NOT NULL,
          t0_us INTEGER NOT NULL, t1_us INTEGER NOT NULL, min REAL, max REAL, bad INTEGER NOT NULL) STRICT;
        CREATE TABLE analysis(id INTEGER PRIMARY KEY, utc TEXT NOT NULL, kind TEXT NOT NULL, settings_sha256 TEXT NOT NULL, software TEXT NOT NULL,
          result TEXT NOT NULL, sha256 TEXT NOT NULL) STRICT;
        """;
}
