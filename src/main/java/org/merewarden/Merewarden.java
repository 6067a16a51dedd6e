package org.merewarden;

import org.springframework.boot.SpringApplication;
import org.springframework.boot.autoconfigure.SpringBootApplication;

/** The server. */
@SpringBootApplication
public class Merewarden {
    public static void main(String[] args) {
        SpringApplication.run(Merewarden.class, args);
    }
}
