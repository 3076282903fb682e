"""Pages, figures, links, print and command line of Sillhead."""
