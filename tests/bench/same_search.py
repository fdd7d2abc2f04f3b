"""The same question to DuckDB: mean rate of the latest run of every lot. Usage: same_search.py ARCHIVE"""

import sys

import duckdb

files = f"read_parquet('{sys.argv[1]}/springs/*/*/*.parquet')"
rows = duckdb.sql(
    f"""
    WITH latest AS (
        SELECT drawing, lot, supplier, max_by(run, (run_number, judged_at, run)) AS run
        FROM {files} GROUP BY ALL)
    SELECT drawing, lot, supplier, avg(value) FROM {files} SEMI JOIN latest USING (run)
    WHERE characteristic = 'rate' AND value IS NOT NULL GROUP BY ALL ORDER BY ALL
    """
).fetchall()
print(len(rows))
