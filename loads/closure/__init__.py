"""Stop-log closures: logs, posts, anchors, seals, overflow and handling."""
