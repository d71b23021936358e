"""The window around the workspaces: top bar, menus, files, recovery, notices."""
