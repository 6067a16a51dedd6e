package org.merewarden;

import java.io.FileDescriptor;
import java.io.FileOutputStream;
import java.io.PrintStream;
import java.nio.charset.StandardCharsets;
import java.util.List;
import org.merewarden.command.CommandLine;
import org.springframework.boot.SpringApplication;
import org.springframework.boot.autoconfigure.SpringBootApplication;

/** The server, unless the first argument is a command. */
@SpringBootApplication
public class Merewarden {
    public static void main(String[] args) {
        if (CommandLine.isServer(args)) {
            SpringApplication.run(Merewarden.class, args);
        } else {
            System.exit(CommandLine.run(List.of(args), utf8(FileDescriptor.out), utf8(FileDescriptor.err)));
        }
    }

    private static PrintStream utf8(FileDescriptor stream) {
        return new PrintStream(new FileOutputStream(stream), true, StandardCharsets.UTF_8);
    }
}
