"""The year file with pandas: read_csv alone, or the whole way into MariaDB. Prints seconds, kWh."""
import json
import os
import sys
import time

import numpy as np
import pandas as pd
import sqlalchemy as sa

mode, path, url, coefficients, work_dir = sys.argv[1:6]
with open(coefficients, encoding="utf8") as file:
    IF97 = json.load(file)
CONST = IF97["constants"]
PRESSURE_MPA = 0.501325


def water(celsius, want):
    """Density or enthalpy of IF97 Region 1 for a whole column; pressure is one number, so only
    the powers of temperature are vectors."""
    kelvin = celsius + 273.15
    a = CONST["pi_offset"] - PRESSURE_MPA / CONST["p_star_MPa"]
    b = CONST["T_star_K"] / kelvin - CONST["tau_offset"]
    total = np.zeros_like(b)
    for term in IF97["terms"]:
        i, j, n = term["I"], term["J"], term["n"]
        if want == "density":
            if i:
                total -= n * i * a ** (i - 1) * b**j
        elif j:
            total += n * a**i * j * b ** (j - 1.0)
    if want == "density":
        return 1000 * CONST["p_star_MPa"] / (CONST["R_kJ_per_kgK"] * kelvin * total)
    return CONST["R_kJ_per_kgK"] * CONST["T_star_K"] * total


def energy(frame):
    flow = frame["flow m3/h"].to_numpy()
    supply = frame["supply °C"].to_numpy()
    back = frame["return °C"].to_numpy()
    power = flow * water(back, "density") / 3600 * (water(back, "enthalpy") - water(supply, "enthalpy"))
    at_s = frame["timestamp"].to_numpy().astype("datetime64[s]").astype("int64")
    kwh = float(np.sum((power[1:] + power[:-1]) / 2 * np.diff(at_s)) / 3600)
    rows = pd.DataFrame(
        {"point_id": 1, "at_s": at_s, "flow": flow, "supply": supply, "back": back, "power_kw": power}
    )
    return rows, kwh


engine = None if mode == "read" else sa.create_engine(url)
started = time.perf_counter()
frame = pd.read_csv(path, parse_dates=["timestamp"] if mode != "read" else None)
kwh = 0.0
if mode != "read":
    rows, kwh = energy(frame)
    table = f"pandas_{mode}"
    with engine.begin() as connection:
        connection.execute(sa.text(f"DROP TABLE IF EXISTS {table}"))
        connection.execute(
            sa.text(
                f"CREATE TABLE {table} (point_id INT UNSIGNED NOT NULL, at_s INT UNSIGNED NOT NULL,"
                " flow FLOAT NOT NULL, supply FLOAT NOT NULL, back FLOAT NOT NULL,"
                " power_kw FLOAT NOT NULL, PRIMARY KEY (point_id, at_s))"
            )
        )
        if mode == "tosql":
            rows.to_sql(table, connection, if_exists="append", index=False, chunksize=10_000)
        else:
            out = os.path.join(work_dir, "pandas_rows.csv")
            rows.to_csv(out, index=False, header=False)
            os.chmod(out, 0o644)
            connection.execute(
                sa.text(f"LOAD DATA INFILE '{out}' INTO TABLE {table} FIELDS TERMINATED BY ','")
            )
print(json.dumps({"seconds": time.perf_counter() - started, "kwh": kwh, "rows": len(frame)}))
