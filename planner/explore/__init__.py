"""The answer under changed inputs."""
