using Microsoft.Data.Sqlite;

namespace ArrayWatch.Storage;

/// <summary>Opens the file and brings its schema up to date.</summary>
internal static class Schema
{
    /// <summary>Each entry brings user_version from its index to the next.</summary>
    private static readonly string[] s_migrations =
    [
        """
        CREATE TABLE layout (id INTEGER PRIMARY KEY, array TEXT NOT NULL, labels TEXT NOT NULL, UNIQUE (array, labels));
        CREATE TABLE metric (array TEXT NOT NULL, name TEXT NOT NULL, seconds INTEGER NOT NULL, time INTEGER NOT NULL,
          layout INTEGER NOT NULL, data BLOB NOT NULL, PRIMARY KEY (array, name, seconds, time)) WITHOUT ROWID;
        CREATE TABLE alert (id TEXT PRIMARY KEY, array TEXT NOT NULL, state INTEGER NOT NULL, raised INTEGER NOT NULL,
          changed INTEGER NOT NULL, body BLOB NOT NULL);
        CREATE INDEX alert_raised ON alert (raised);
        CREATE TABLE alert_change (row INTEGER PRIMARY KEY AUTOINCREMENT, id TEXT NOT NULL, body BLOB NOT NULL, UNIQUE (id, body));
        CREATE TABLE audit (row INTEGER PRIMARY KEY AUTOINCREMENT, alert TEXT NOT NULL, body BLOB NOT NULL);
        CREATE INDEX audit_alert ON audit (alert);
        CREATE TABLE picture (row INTEGER PRIMARY KEY AUTOINCREMENT, array TEXT NOT NULL, time INTEGER NOT NULL,
          frequency REAL NOT NULL, scale TEXT NOT NULL, body BLOB NOT NULL, UNIQUE (array, time, frequency, scale));
        CREATE TABLE outbox (row INTEGER PRIMARY KEY AUTOINCREMENT, kind INTEGER NOT NULL, array TEXT NOT NULL, time INTEGER NOT NULL, body BLOB NOT NULL);
        CREATE TABLE cursor (target TEXT PRIMARY KEY, row INTEGER NOT NULL);
        """,
        // Rows of a kilobyte take an overflow page each in a table without row ids; and a layout that changes within an interval has a row of its own.
        """
        CREATE TABLE metric_row (array TEXT NOT NULL, name TEXT NOT NULL, seconds INTEGER NOT NULL, time INTEGER NOT NULL,
          layout INTEGER NOT NULL, data BLOB NOT NULL);
        INSERT INTO metric_row SELECT array, name, seconds, time, layout, data FROM metric;
        DROP TABLE metric;
        ALTER TABLE metric_row RENAME TO metric;
        CREATE UNIQUE INDEX metric_place ON metric (array, name, seconds, time, layout);
        """,
    ];

    public static SqliteConnection Open(string path)
    {
        try
        {
            if (Path.GetDirectoryName(Path.GetFullPath(path)) is { Length: > 0 } folder) Directory.CreateDirectory(folder);
        }
        catch (Exception e) when (e is IOException or UnauthorizedAccessException or ArgumentException or NotSupportedException)
        {
            throw new StoreUnavailableException($"the folder of the store '{path}' cannot be made: {e.Message}", e);
        }

        SqliteConnection c = new(new SqliteConnectionStringBuilder { DataSource = path, DefaultTimeout = 2 }.ToString());
        try
        {
            c.Open();
            Run(c, "PRAGMA journal_mode=WAL; PRAGMA synchronous=NORMAL;");
            if (Scalar(c, "PRAGMA quick_check(1)") is not "ok")
                throw new StoreUnavailableException($"the store '{path}' is damaged; move it away, and a new one is begun");
            long version = (long)Scalar(c, "PRAGMA user_version")!;
            if (version > s_migrations.Length)
                throw new StoreUnavailableException($"the store '{path}' has schema {version}, newer than this program's {s_migrations.Length}");
            for (; version < s_migrations.Length; version++)
                Run(c, $"BEGIN IMMEDIATE; {s_migrations[version]} PRAGMA user_version={version + 1}; COMMIT;");
            Run(c, "BEGIN IMMEDIATE; ROLLBACK;");
            return c;
        }
        catch (SqliteException e)
        {
            c.Dispose();
            throw new StoreUnavailableException($"the store '{path}' cannot be used: {e.Message}", e);
        }
        catch (StoreUnavailableException)
        {
            c.Dispose();
            throw;
        }
    }

    public static void Run(SqliteConnection c, string sql, params (string Name, object Value)[] values)
    {
        using SqliteCommand k = Command(c, sql, values);
        k.ExecuteNonQuery();
    }

    public static object? Scalar(SqliteConnection c, string sql, params (string Name, object Value)[] values)
    {
        using SqliteCommand k = Command(c, sql, values);
        return k.ExecuteScalar();
    }

    public static SqliteCommand Command(SqliteConnection c, string sql, params (string Name, object Value)[] values)
    {
        SqliteCommand k = c.CreateCommand();
#pragma warning disable CA2100 // Every text is a constant of this project; values are parameters.
        k.CommandText = sql;
#pragma warning restore CA2100
        foreach ((string name, object value) in values) k.Parameters.AddWithValue(name, value);
        return k;
    }
}
