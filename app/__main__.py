"""`python3 -m app`, and `striketrace` after an installation. Sets up on first use, then hands over."""

import sys


def main() -> int:
    from app.first_start import first_use

    first_use.prepare()
    # Imported only now: it needs the packages that the line above has made sure of.
    from app.command_line import main as run

    return run(sys.argv[1:])


if __name__ == "__main__":
    raise SystemExit(main())
