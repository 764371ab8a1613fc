"""Audits CNC lathe programs before they meet metal."""
