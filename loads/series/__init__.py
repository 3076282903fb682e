"""Stage and level series: what was observed, what is forecast, how old it is and what is odd about it."""
