package org.whither.io.paths;

import com.fasterxml.jackson.core.io.NumberOutput;
import java.io.IOException;
import java.io.OutputStream;
import java.nio.charset.StandardCharsets;
import java.nio.file.Files;
import java.nio.file.Path;
import java.util.List;
import org.whither.trace.SampledPath;

/**
 * One row a point, as text: RFC 4180, except that lines end with a line feed alone. Numbers have as many digits as name
 * the 64-bit number exactly.
 */
final class CsvOutput implements PathOutput<byte[]> {
    static final String HEADER = "tracer,time_s,theta_rad,radius_m,z_m,sigma,speed_m_s,pressure_pa\n";

    private final OutputStream out;

    CsvOutput(Path file) throws IOException {
        out = Files.newOutputStream(file);
        out.write(HEADER.getBytes(StandardCharsets.US_ASCII));
    }

    @Override
    public byte[] prepare(List<EndedPath> paths) {
        StringBuilder text = new StringBuilder(1 << 16);
        for (EndedPath each : paths) {
            SampledPath path = each.path();
            for (int n = 0; n < path.size(); n++) {
                text.append(each.number());
                for (int column = 0; column < SampledPath.COLUMNS; column++) {
                    text.append(',').append(NumberOutput.toString(path.value(n, column), true));
                }
                text.append('\n');
            }
        }
        return text.toString().getBytes(StandardCharsets.US_ASCII);
    }

    @Override
    public void write(byte[] rows) throws IOException {
        out.write(rows);
    }

    @Override
    public void finish(PathTotals totals) throws IOException {
        out.close();
    }

    @Override
    public void close() throws IOException {
        out.close();
    }
}
