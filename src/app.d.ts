declare global {
	namespace App {
		interface Error {
			message: string;
			/** names this failure in the server's log */
			id?: string;
		}
	}
}

export {};
