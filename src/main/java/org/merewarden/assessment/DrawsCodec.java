package org.merewarden.assessment;

import java.io.ByteArrayInputStream;
import java.io.ByteArrayOutputStream;
import java.io.DataInputStream;
import java.io.DataOutputStream;
import java.io.IOException;
import java.io.UncheckedIOException;
import java.util.Arrays;
import java.util.Map;
import java.util.TreeMap;
import java.util.zip.DeflaterOutputStream;
import java.util.zip.InflaterInputStream;
import org.merewarden.core.inference.Posterior;

/**
 * Draws as compressed bytes: a format number, draws and seasons, then for each draw MSY, FMSY and shape as doubles and
 * T + 1 biomasses and T fishing mortalities as floats (seven digits; 1,000 draws of 35 seasons take about 250 kB).
 *
 * <p>Format 2 adds the number of seasons whose removals are known (T or 0) and the number of further parameters before
 * the draws, the removals of each draw, and after the draws each parameter's name with one double a draw. Format 1 is
 * still read: assessments are never rewritten.
 */
final class DrawsCodec {
    private static final int FIRST_FORMAT = 1;
    private static final int FORMAT = 2;

    /** The arrays of a posterior, indexed as there. */
    record Draws(
            double[] msy,
            double[] fmsy,
            double[] shape,
            double[][] biomass,
            double[][] fishing,
            double[][] removals,
            Map<String, double[]> parameters) {}

    private DrawsCodec() {}

    static byte[] encode(Posterior posterior) {
        var bytes = new ByteArrayOutputStream();
        try (var out = new DataOutputStream(new DeflaterOutputStream(bytes))) {
            int draws = posterior.draws();
            out.writeInt(FORMAT);
            out.writeInt(draws);
            out.writeInt(posterior.seasons());
            out.writeInt(draws == 0 ? 0 : posterior.removalsTonnes()[0].length);
            out.writeInt(posterior.parameters().size());
            for (int i = 0; i < draws; i++) {
                out.writeDouble(posterior.msyTonnes()[i]);
                out.writeDouble(posterior.fmsyPerYear()[i]);
                out.writeDouble(posterior.shape()[i]);
                writeFloats(out, inRange(posterior.biomassTonnes()[i]));
                writeFloats(out, posterior.fishingPerYear()[i]);
                writeFloats(out, posterior.removalsTonnes()[i]);
            }
            for (var parameter : new TreeMap<>(posterior.parameters()).entrySet()) {
                out.writeUTF(parameter.getKey());
                for (double value : parameter.getValue()) {
                    out.writeDouble(value);
                }
            }
        } catch (IOException e) {
            throw new UncheckedIOException(e);
        }
        return bytes.toByteArray();
    }

    static Draws decode(byte[] bytes) {
        try (var in = new DataInputStream(new InflaterInputStream(new ByteArrayInputStream(bytes)))) {
            int format = in.readInt();
            if (format != FIRST_FORMAT && format != FORMAT) {
                throw new IllegalStateException("needs draws of format 1 or 2, got " + format);
            }
            int count = in.readInt();
            int seasons = in.readInt();
            int caught = format == FORMAT ? in.readInt() : 0;
            int parameters = format == FORMAT ? in.readInt() : 0;
            var draws = new Draws(
                    new double[count],
                    new double[count],
                    new double[count],
                    new double[count][seasons + 1],
                    new double[count][seasons],
                    new double[count][caught],
                    new TreeMap<>());
            for (int i = 0; i < count; i++) {
                draws.msy()[i] = in.readDouble();
                draws.fmsy()[i] = in.readDouble();
                draws.shape()[i] = in.readDouble();
                readFloats(in, draws.biomass()[i]);
                readFloats(in, draws.fishing()[i]);
                readFloats(in, draws.removals()[i]);
            }
            for (int k = 0; k < parameters; k++) {
                String name = in.readUTF();
                double[] values = new double[count];
                for (int i = 0; i < count; i++) {
                    values[i] = in.readDouble();
                }
                draws.parameters().put(name, values);
            }
            return draws;
        } catch (IOException e) {
            throw new UncheckedIOException(e);
        }
    }

    /** A biomass too small or too large for a float stays positive and finite. */
    private static double[] inRange(double[] biomass) {
        return Arrays.stream(biomass)
                .map(b -> Math.max(Float.MIN_NORMAL, Math.min(Float.MAX_VALUE, b)))
                .toArray();
    }

    private static void writeFloats(DataOutputStream out, double[] values) throws IOException {
        for (double value : values) {
            out.writeFloat((float) value);
        }
    }

    private static void readFloats(DataInputStream in, double[] values) throws IOException {
        for (int i = 0; i < values.length; i++) {
            values[i] = in.readFloat();
        }
    }
}
