"""Where the demo projects lie: beside `app`, in a checkout and in an installation alike (see pyproject.toml)."""

from pathlib import Path


def demo_paths() -> list[Path]:
    """All demo projects, sorted by file name. Empty where somebody took the folder away."""
    return sorted((Path(__file__).resolve().parent.parent / "demo_projects").glob("*.strike"))
