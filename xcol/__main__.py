"""``python -m xcol``."""

from xcol.cli import main

if __name__ == "__main__":
    main()
