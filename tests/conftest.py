"""What all tests share: how hard hypothesis searches. Imports no Qt, so that the solver's tests run without it.

`python3 -m tests` uses the profile `ci`: the same examples at every run, few enough for the suite to stay quick.
`python3 -m tests --hypothesis-profile nightly` searches anew each time, and much further.
"""

from hypothesis import HealthCheck, settings

# No deadline: the first example of a test may compile kernels, and two cores are shared by whatever else runs.
settings.register_profile(
    "ci", derandomize=True, max_examples=40, deadline=None, suppress_health_check=[HealthCheck.too_slow]
)
settings.register_profile("nightly", max_examples=1000, deadline=None, print_blob=True)
settings.load_profile("ci")
