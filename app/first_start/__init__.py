"""From a bare checkout to a running interpreter: packages, `.venv`, what Qt needs. Standard library only."""
