"""Tests of Sillhead: literature, reference libraries, laws, pages."""
