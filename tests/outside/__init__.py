"""Published cases and sourced facts, put through the public interface only."""
