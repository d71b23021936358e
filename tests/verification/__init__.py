"""One page that shows every published check: `python3 -m tests verification`."""
