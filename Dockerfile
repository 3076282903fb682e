FROM python:3.11-slim-bookworm

RUN apt-get update \
    && apt-get install --yes --no-install-recommends \
        libpango-1.0-0 libpangoft2-1.0-0 libharfbuzz-subset0 fonts-dejavu-core \
    && rm -rf /var/lib/apt/lists/* \
    && useradd --system --create-home sillhead \
    && install --directory --owner sillhead --group sillhead /data

COPY pyproject.toml README.md /source/
COPY loads /source/loads
COPY webapp /source/webapp
COPY scenarios /source/scenarios
RUN pip install --no-cache-dir /source && rm -rf /source

USER sillhead
WORKDIR /data
VOLUME /data
ENV SILLHEAD_DATA=/data PYTHONUNBUFFERED=1
EXPOSE 8501
HEALTHCHECK --interval=30s --timeout=5s --start-period=20s \
    CMD ["python", "-c", "import urllib.request as u; u.urlopen('http://127.0.0.1:8501/healthz', timeout=4)"]
CMD ["sillhead", "serve", "--address", "0.0.0.0", "--port", "8501"]
