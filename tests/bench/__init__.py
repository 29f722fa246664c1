"""Speed, as ratios within one run: ``python -m tests.bench [solver | start | window]``.

Machines here are noisy, so every figure stands beside a floor timed in the same run, in turns with it.
"""
