"""A file of 50 MB is read in bounded time and memory."""

from __future__ import annotations

import subprocess
import sys

import pytest

_PROGRAM = """
import io, resource, sys, time
from datetime import datetime, timedelta
form = sys.argv[1]
heads = {
    "rdb": "agency_cd\\tsite_no\\tdatetime\\ttz_cd\\t1_00065\\t1_00065_cd\\n"
    "5s\\t15s\\t20d\\t6s\\t14n\\t10s\\n",
    "csv": "time,stage_ft,flag\\n",
}
rows = {"rdb": "USGS\\t09999999\\t{0}\\tCST\\t{1:.2f}\\tP\\n", "csv": "{0}Z,{1:.2f},P\\n"}
buffer = io.BytesIO()
buffer.write(heads[form].encode())
count = 0
start = datetime(2000, 1, 1)
while buffer.tell() < 49_990_000:
    when = start + timedelta(minutes=count)
    buffer.write(rows[form].format(when.isoformat(" ", "minutes"), 20 + count % 997 / 100).encode())
    count += 1
data = buffer.getvalue()
del buffer
from loads.series.read import read_series
began = time.perf_counter()
[series] = read_series(data)
took = time.perf_counter() - began
assert len(series) == count, (len(series), count)
print(took, resource.getrusage(resource.RUSAGE_SELF).ru_maxrss / 1024)
"""


@pytest.mark.slow
@pytest.mark.parametrize("form", ["rdb", "csv"])
def test_fifty_megabytes(form: str, request: pytest.FixtureRequest) -> None:
    if "slow" not in str(request.config.getoption("-m")):
        pytest.skip("takes half a minute; run with -m slow")
    ran = subprocess.run([sys.executable, "-c", _PROGRAM, form], capture_output=True, text=True, check=True)
    seconds, megabytes = map(float, ran.stdout.split())
    assert megabytes < 300
    assert seconds < 120
