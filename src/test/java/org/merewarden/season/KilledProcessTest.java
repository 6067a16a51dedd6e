package org.merewarden.season;

import static org.assertj.core.api.Assertions.assertThat;

import java.io.IOException;
import java.net.CookieManager;
import java.net.ServerSocket;
import java.net.URI;
import java.net.URLEncoder;
import java.net.http.HttpClient;
import java.net.http.HttpRequest;
import java.net.http.HttpResponse;
import java.nio.charset.StandardCharsets;
import java.nio.file.Files;
import java.nio.file.Path;
import java.time.LocalDate;
import java.time.ZoneOffset;
import java.util.ArrayList;
import java.util.List;
import java.util.SplittableRandom;
import java.util.UUID;
import java.util.concurrent.TimeUnit;
import java.util.regex.Matcher;
import java.util.regex.Pattern;
import org.flywaydb.core.Flyway;
import org.h2.jdbcx.JdbcDataSource;
import org.junit.jupiter.api.AfterEach;
import org.junit.jupiter.api.Tag;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.io.TempDir;
import org.merewarden.Merewarden;
import org.merewarden.TestRegion;
import org.springframework.jdbc.core.simple.JdbcClient;

/**
 * What was acknowledged survives the death of the process: the application runs as a process of its own, is killed
 * (SIGKILL, no chance to write anything) right after a reply, and holds every acknowledged landing exactly once when it
 * is started again. A re-sent form after the restart is stored once, too.
 */
@Tag("kill")
class KilledProcessTest {
    private static final int ROUNDS = 10;
    private static final int MOST_LANDINGS = 20;

    @TempDir
    Path data;

    private Process process;
    private String base;
    private HttpClient client;

    @AfterEach
    void stop() throws InterruptedException {
        if (process != null) {
            process.destroyForcibly().waitFor(10, TimeUnit.SECONDS);
        }
    }

    @Test
    void everyAcknowledgedLandingIsThereOnceAfterTheKill() throws Exception {
        prepareStore();
        List<String> acknowledged = new ArrayList<>();
        SplittableRandom random = new SplittableRandom(20261201);
        for (int round = 0; round < ROUNDS; round++) {
            start();
            String csrf = csrf("/landings/new");
            for (int left = random.nextInt(1, MOST_LANDINGS); left > 0; left--) {
                String key = UUID.randomUUID().toString();
                assertThat(send(key, csrf)).isEqualTo(302);
                acknowledged.add(key);
            }
            process.destroyForcibly().waitFor();
        }
        start();
        String last = acknowledged.get(acknowledged.size() - 1);
        assertThat(send(last, csrf("/landings/new"))).isEqualTo(302);
        int season = LocalDate.now(ZoneOffset.UTC).getYear();
        String csv = get("/season/" + season + "/landings.csv").body();
        for (String key : acknowledged) {
            assertThat(csv.split(Pattern.quote(key), -1))
                    .as("times that %s is in the log", key)
                    .hasSize(2);
        }
        assertThat(csv.lines().filter(line -> line.contains("kill-water"))).hasSize(acknowledged.size());
    }

    /** A lake in the demonstration's store, so that a clerk can sign in and the store is not empty. */
    private void prepareStore() {
        JdbcDataSource source = new JdbcDataSource();
        source.setURL("jdbc:h2:file:" + data + "/demonstration");
        source.setUser("sa");
        Flyway.configure()
                .dataSource(source)
                .locations("classpath:db/migration")
                .load()
                .migrate();
        TestRegion region = new TestRegion(JdbcClient.create(source));
        region.stock(region.lake("kill-water", "Kill Water"), "FPE");
    }

    private void start() throws Exception {
        int port;
        try (ServerSocket free = new ServerSocket(0)) {
            port = free.getLocalPort();
        }
        base = "http://localhost:" + port;
        Path log = data.resolve("log-" + port + ".txt");
        ProcessBuilder builder = new ProcessBuilder(
                Path.of(System.getProperty("java.home"), "bin", "java").toString(),
                "-XX:TieredStopAtLevel=1",
                "-XX:+UseSerialGC",
                "-Xmx512m",
                "-cp",
                System.getProperty("java.class.path"),
                Merewarden.class.getName(),
                "--spring.profiles.active=demo",
                "--server.port=" + port);
        builder.environment().put("MEREWARDEN_DATA", data.toString());
        process = builder.redirectErrorStream(true).redirectOutput(log.toFile()).start();
        client = HttpClient.newBuilder().cookieHandler(new CookieManager()).build();
        long end = System.nanoTime() + TimeUnit.SECONDS.toNanos(120);
        while (!healthy()) {
            assertThat(process.isAlive()).as(() -> read(log)).isTrue();
            assertThat(System.nanoTime()).as("not healthy after two minutes").isLessThan(end);
            Thread.sleep(300);
        }
        signIn();
    }

    private static String read(Path log) {
        try {
            return Files.readString(log);
        } catch (IOException e) {
            return e.toString();
        }
    }

    private boolean healthy() throws InterruptedException {
        try {
            return get("/actuator/health/readiness").statusCode() == 200;
        } catch (IOException e) {
            return false;
        }
    }

    private void signIn() throws Exception {
        String page = get("/sign-in").body();
        Matcher password = Pattern.compile("<code>clerk</code>\\s*</td>\\s*<td[^>]*><code>([^<]+)</code>")
                .matcher(page);
        assertThat(password.find()).isTrue();
        int status = post("/sign-in", "username", "clerk", "password", password.group(1), "_csrf", csrfIn(page));
        assertThat(status).isEqualTo(302);
    }

    private int send(String key, String csrf) throws Exception {
        return post(
                "/landings",
                "_csrf",
                csrf,
                "key",
                key,
                "date",
                LocalDate.now(ZoneOffset.UTC).toString(),
                "lake",
                "kill-water",
                "lines[0].species",
                "FPE",
                "lines[0].weight",
                "12.5");
    }

    private String csrf(String address) throws Exception {
        return csrfIn(get(address).body());
    }

    private static String csrfIn(String page) {
        Matcher token = Pattern.compile("name=\"_csrf\" value=\"([^\"]+)\"").matcher(page);
        assertThat(token.find()).as(page).isTrue();
        return token.group(1);
    }

    private HttpResponse<String> get(String address) throws IOException, InterruptedException {
        return client.send(
                HttpRequest.newBuilder(URI.create(base + address)).build(), HttpResponse.BodyHandlers.ofString());
    }

    private int post(String address, String... fields) throws IOException, InterruptedException {
        StringBuilder body = new StringBuilder();
        for (int i = 0; i < fields.length; i += 2) {
            body.append(i == 0 ? "" : "&")
                    .append(URLEncoder.encode(fields[i], StandardCharsets.UTF_8))
                    .append('=')
                    .append(URLEncoder.encode(fields[i + 1], StandardCharsets.UTF_8));
        }
        HttpRequest request = HttpRequest.newBuilder(URI.create(base + address))
                .header("Content-Type", "application/x-www-form-urlencoded")
                .POST(HttpRequest.BodyPublishers.ofString(body.toString()))
                .build();
        return client.send(request, HttpResponse.BodyHandlers.discarding()).statusCode();
    }
}
