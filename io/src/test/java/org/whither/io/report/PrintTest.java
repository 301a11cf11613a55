package org.whither.io.report;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertTrue;
import static org.junit.jupiter.api.Assumptions.assumeTrue;

import java.io.IOException;
import java.nio.charset.StandardCharsets;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.ArrayList;
import java.util.List;
import java.util.concurrent.TimeUnit;
import java.util.regex.Matcher;
import java.util.regex.Pattern;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.api.io.TempDir;

/** The page in a browser: it prints on two pages A4 and the browser has nothing to say about it. Needs chromium. */
class PrintTest {
    private static final Path BROWSER = Path.of("/usr/bin/chromium");
    private static final Pattern PAGES = Pattern.compile("/Type\\s*/Pages\\b.*?/Count\\s+(\\d+)", Pattern.DOTALL);

    @TempDir
    private Path folder;

    @Test
    void page_printed_fillsTwoPagesOfA4AndSaysNothing() throws IOException, InterruptedException {
        assumeTrue(Files.isExecutable(BROWSER), "chromium is not installed");
        Path page = folder.resolve("report.html");
        Path pdf = folder.resolve("report.pdf");
        Path said = folder.resolve("said.txt");
        Files.writeString(page, ReportPageTest.fullPage());
        List<String> command = new ArrayList<>(List.of(
                BROWSER.toString(),
                "--headless",
                "--no-sandbox",
                "--disable-gpu",
                "--disable-quic",
                "--no-first-run",
                "--disable-background-networking",
                "--disable-component-update",
                "--disable-sync",
                "--enable-logging=stderr",
                "--no-pdf-header-footer",
                "--user-data-dir=" + Files.createDirectory(folder.resolve("profile")),
                "--print-to-pdf=" + pdf,
                page.toUri().toString()));
        Process browser = new ProcessBuilder(command)
                .redirectErrorStream(true)
                .redirectOutput(said.toFile())
                .start();
        boolean ended = browser.waitFor(60, TimeUnit.SECONDS);
        browser.destroyForcibly();
        assertTrue(ended && Files.exists(pdf), Files.readString(said));
        Matcher pages = PAGES.matcher(Files.readString(pdf, StandardCharsets.ISO_8859_1));
        assertTrue(pages.find(), "a count of pages in the PDF");
        assertEquals("2", pages.group(1));
        assertTrue(
                Files.readString(pdf, StandardCharsets.ISO_8859_1)
                        .matches("(?s).*MediaBox \\[0 0 59[45][0-9.]* 84[12].*"),
                "A4");
        List<String> console = Files.readString(said)
                .lines()
                .filter(line -> line.contains("CONSOLE"))
                .toList();
        assertEquals(List.of(), console);
    }
}
