"""What a scenario consists of: frozen records, each field with its meaning, unit and accepted range."""
