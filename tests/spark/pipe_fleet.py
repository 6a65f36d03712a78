"""The program as the mapper of a distributed engine: rows piped through it partition by partition give
what one run gives.

    python tests/spark/pipe_fleet.py target/release/coldsump

Skips with a message where pyspark is not installed.
"""

import json
import subprocess
import sys
from pathlib import Path

try:
    from pyspark import SparkConf, SparkContext
except ImportError:
    print("skipped: pyspark is not installed here")
    sys.exit(0)

program = Path(sys.argv[1]).resolve()
root = Path(__file__).resolve().parents[2]
base = root / "examples" / "hollow-skid.toml"
rows = [
    json.dumps({
        "machine": f"Skid {at:03}",
        "base": str(base),
        "site.minimum_temperature": f"{-20 - at % 17} °C",
        "reservoir.oil_volume": f"{40 + at % 9} L",
    })
    for at in range(240)
]
command = f"{program} fleet - --format jsonl"
direct = subprocess.run(
    command.split(), input="\n".join(rows) + "\n", capture_output=True, text=True, check=False)
assert direct.returncode in (0, 3), direct.stderr
wanted = direct.stdout.splitlines()
assert len(wanted) == len(rows)

conf = SparkConf().setMaster("local[2]").setAppName("pipe").set("spark.ui.enabled", "false")
with SparkContext(conf=conf) as context:
    context.setLogLevel("ERROR")
    # Exit code 3 says that some machine starts by no plan: an answer, not a failure.
    found = context.parallelize(rows, 8).pipe(f"sh -c '{command}; test $? -le 3'").collect()
assert found == wanted, "the partitions give another answer than one run"
print(f"{len(rows)} rows in 8 partitions: equal to one run")
