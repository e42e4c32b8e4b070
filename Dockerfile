# Web, worker and scheduler are one image with three commands. It holds no secret and no data.
FROM python:3.12-slim-bookworm

# What lays out the text of the paper; libharfbuzz-subset0 keeps it quick and its bytes stable.
RUN apt-get update -q -q \
    && apt-get install -q -q -y --no-install-recommends libpango-1.0-0 libpangoft2-1.0-0 libharfbuzz-subset0 \
    && rm -rf /var/lib/apt/lists/*

ENV PYTHONUNBUFFERED=1 PYTHONDONTWRITEBYTECODE=1 DJANGO_SETTINGS_MODULE=service.settings
WORKDIR /tarebook
COPY requirements.lock ./
RUN pip install --quiet --no-cache-dir --require-hashes --no-deps --only-binary :all: -r requirements.lock

COPY manage.py ./
COPY service service
COPY fleet fleet
COPY loads loads
COPY records records
COPY templates templates
COPY static static

RUN useradd --system --uid 10001 --no-create-home tarebook
USER 10001
EXPOSE 8000
CMD ["python", "-m", "granian", "--interface", "wsgi", "--host", "0.0.0.0", "--port", "8000", "--workers", "2", \
     "--blocking-threads", "4", "--no-ws", "--respawn-failed-workers", "service.proven:application"]
