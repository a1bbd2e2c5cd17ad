# Quantiles of three samples that any program makes to the last bit: v = frac(k φ), x = v/(1 − v).
import json, numpy, scipy
from scipy.stats import mstats
phi = 0.6180339887498949
rows = []
for count in [20, 1024, 10007]:
    v = (numpy.arange(1, count + 1) * phi) % 1.0
    x = v / (1.0 - v)
    for p in [0.05, 0.5, 0.95]:
        a = float(numpy.quantile(x, p))
        b = float(mstats.mquantiles(x, p, alphap=1, betap=1)[0])
        assert abs(a / b - 1) < 1e-12, (a, b)
        rows.append([count, p, a])
print(json.dumps({
    "command": "python3 tests/data/quantiles.py > tests/data/quantiles.json",
    "numpy": numpy.__version__, "scipy": scipy.__version__, "rows": rows}, indent=1))
