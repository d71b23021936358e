"""The solver against published closed forms: one small function a check, one file a topic.

`test_published.py` runs every check; `python3 -m tests verification` writes them all on one page.
"""
